/**
 * Takes away one guard at a time in a copy of the checkout and expects the tests to notice: `node tests/people/mutations.mjs [file]`,
 * all of them or those in files whose name contains the given text.
 * A guard whose absence nobody notices is named, and the command fails.
 */
import { cpSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { run } from '../../src/launch/command.mjs';
import { startCluster } from '../../src/launch/postgres.mjs';

const FAST = [
	'src/lib/server/auth',
	'src/lib/server/policy.test.ts',
	'src/lib/server/hooks',
	'tests/people/rights.test.ts'
];
const THROUGH_THE_SERVER = ['tests/people/policy-walk.test.ts'];

/** @typedef {{ file: string, from: string, to: string, tests?: string[] }} Mutation */

const OF_STUDIES = ['tests/db/studies.test.ts'];
const OF_RECORDS = ['tests/db/records.test.ts'];
const OF_SHARING = ['tests/db/study-sharing.test.ts'];
const OF_SCREENINGS = ['tests/db/screenings.test.ts'];
const OF_THE_DESK = ['tests/db/curators-desk.test.ts'];

/** @type {Mutation[]} */
const guards = [
	{
		file: 'records/access.ts',
		from: "if (!reader) return eq(recordAccess.visibility, 'everybody');",
		to: "if (!reader) return eq(recordAccess.visibility, 'signed-in');",
		tests: OF_RECORDS
	},
	{
		file: 'records/records.ts',
		from: "if (!own) throw new Forbidden('Who sees a record is for its owner to say.');",
		to: '',
		tests: OF_RECORDS
	},
	{
		file: 'records/freeze.ts',
		from: 'if (is !== wanted)',
		to: 'if (is !== is)',
		tests: OF_RECORDS
	},
	{
		file: 'studies/links.ts',
		from: '						isNull(studyLink.revokedAt),\n							gt(studyLink.expiresAt, now())',
		to: '						gt(studyLink.expiresAt, now())',
		tests: OF_SHARING
	},
	{
		file: 'studies/links.ts',
		from: '							gt(studyLink.expiresAt, now())\n',
		to: '\n',
		tests: OF_SHARING
	},
	{
		file: 'studies/links.ts',
		from: "if (!own) throw new Forbidden('Who sees a study is for its owner to say.');",
		to: '',
		tests: OF_SHARING
	},
	{
		file: 'studies/transfer.ts',
		from: "if (!own) throw new Forbidden('A study is given away by its owner.');",
		to: '',
		tests: OF_SHARING
	},
	{
		file: 'studies/group-defaults.ts',
		from: 'requireManagesGroup(actor, id);',
		to: '',
		tests: OF_SHARING
	},
	{
		file: 'screening/screenings.ts',
		from: "if (!own) throw new Forbidden('A screening is steered by its owner.');",
		to: '',
		tests: OF_SCREENINGS
	},
	{
		file: 'people/sharing.ts',
		from: 'inArray(visibility, [...open]),',
		to: "inArray(visibility, [...open, 'private', 'group']),",
		tests: OF_STUDIES
	},
	{
		file: 'people/sharing.ts',
		from: "and(eq(visibility, 'group'), inArray(groupId, groups))",
		to: 'inArray(groupId, groups)',
		tests: OF_STUDIES
	},
	{ file: 'studies/access.ts', from: "visibility === 'group' &&", to: '', tests: OF_STUDIES },
	{ file: 'studies/studies.ts', from: 'if (!mayEdit(actor, locked))', to: 'if (false)', tests: OF_STUDIES },
	{
		file: 'studies/studies.ts',
		from: 'if (decides && locked.ownerId !== actor.id)',
		to: 'if (false)',
		tests: OF_STUDIES
	},
	{
		file: 'library/uploads.ts',
		from: 'and(eq(upload.id, id), eq(upload.personId, actor.id))',
		to: 'eq(upload.id, id)',
		tests: OF_THE_DESK
	},
	{
		file: 'library/curation.ts',
		from: 'if (actor.id === createdBy || actor.id === submittedBy)',
		to: 'if (false)',
		tests: ['tests/api/curation.test.ts']
	},
	{
		file: 'notifications/list.ts',
		from: 'eq(notification.personId, actor.id),\n				isNull(notification.readAt),',
		to: 'isNull(notification.readAt),',
		tests: OF_THE_DESK
	},
	{ file: 'people/rights.ts', from: "if (actor.role !== 'administrator') {", to: 'if (false) {' },
	{
		file: 'people/rights.ts',
		from: "if (actor.role !== 'administrator' && !isMemberOf(actor, groupId)) throw",
		to: 'if (false) throw'
	},
	{
		file: 'people/rights.ts',
		from: "if (actor.role !== 'administrator' && !isLeadOf(actor, groupId)) {",
		to: 'if (false) {'
	},
	{ file: 'people/rights.ts', from: 'if (groupId === null) throw', to: 'if (false) throw' },
	{ file: 'people/rights.ts', from: '!ROLES_OF_A_LEAD.includes(role) || lead', to: 'lead' },
	{
		file: 'people/rights.ts',
		from: '!ROLES_OF_A_LEAD.includes(role) || lead',
		to: '!ROLES_OF_A_LEAD.includes(role)'
	},
	{ file: 'people/invitations.ts', from: 'if (!row || !managed) throw', to: 'if (!row) throw' },
	{ file: 'people/invitations.ts', from: 'visibleTo(actor),', to: 'undefined,' },
	{ file: 'people/invitations.ts', from: '\trequireMayInvite(actor, wanted);', to: '' },
	{ file: 'people/groups.ts', from: '\trequireSeesGroup(actor, found.id);', to: '' },
	{ file: 'people/groups.ts', from: 'if (!found) throw noSuchMember();', to: '' },
	{ file: 'people/groups.ts', from: 'email: managed ? member.email : null', to: 'email: member.email' },
	{ file: 'people/groups.ts', from: 'if (current.closedAt) throw', to: 'if (false) throw' },
	{
		file: 'people/signed-in.ts',
		from: "and(eq(person.id, personId), eq(person.state, 'active'))",
		to: 'eq(person.id, personId)'
	},
	{ file: 'people/tokens.ts', from: 'eq(apiToken.personId, actor.id));\n}', to: 'undefined);\n}' },
	{
		file: 'people/tokens.ts',
		from: 'and(isNull(apiToken.revokedAt), gt(apiToken.expiresAt, at))',
		to: 'gt(apiToken.expiresAt, at)'
	},
	{ file: 'auth/sessions.ts', from: 'gt(session.expiresAt, at),', to: '' },
	{
		file: 'auth/sessions.ts',
		from: 'and(eq(session.personId, personId), eq(session.id, sessionId))',
		to: 'eq(session.id, sessionId)'
	},
	{
		file: 'auth/principal.ts',
		from: "if (!found) return { kind: 'unknown' };",
		to: 'if (!found) return NOBODY;'
	},
	{
		file: 'auth/access.ts',
		from: "return roles.includes(principal.person.role) ? 'yes' : 'forbidden';",
		to: "return 'yes';"
	},
	{ file: 'auth/access.ts', from: 'scope !== null && principal.scopes.includes(scope) &&', to: '' },
	{ file: 'auth/access.ts', from: "signedOut === 'public' && publicReading", to: "signedOut === 'public'" },
	{ file: 'auth/link-intent.ts', from: '|| Number(until) < now().getTime()', to: '' },
	{ file: 'auth/return-to.ts', from: 'origin === here ? text : otherwise', to: 'origin ? text : otherwise' },
	{ file: 'hooks/same-origin.ts', from: 'if (origin !== null) return !isOwn(origin, ownOrigin);', to: '' },
	{
		file: '../../hooks.server.ts',
		from: "if (verdict === 'yes') return resolve(event);",
		to: 'return resolve(event);',
		tests: THROUGH_THE_SERVER
	},
	{
		file: '../../hooks.server.ts',
		from: 'sequence(logged, secured, sameOrigin, identified, permitted)',
		to: 'sequence(logged, secured, identified, permitted)',
		tests: THROUGH_THE_SERVER
	}
];

/** Each place of the administrator's guard on its own: one function that forgets it must not hide behind the others. */
function administratorGuards() {
	const files = [
		'people/people.ts',
		'people/groups.ts',
		'people/tokens.ts',
		'people/installation.ts',
		'people/health.ts'
	];
	return files.flatMap((file) => {
		const text = readFileSync(resolve('src/lib/server', file), 'utf8');
		return text
			.split('\n')
			.flatMap((line, index) => (line === '\trequireAdministrator(actor);' ? [{ file, line: index }] : []));
	});
}

const copy = mkdtempSync(join(tmpdir(), 'hairsbreadth-mutations-'));
for (const name of ['src', 'tests', 'static', 'drizzle', 'data-seed'])
	cpSync(name, join(copy, name), { recursive: true });
for (const name of [
	'package.json',
	'package-lock.json',
	'svelte.config.js',
	'tailwind.config.ts',
	'tsconfig.json',
	'vite.config.ts',
	'vite.threads.config.ts'
]) {
	cpSync(name, join(copy, name));
}
symlinkSync(resolve('node_modules'), join(copy, 'node_modules'));
const cluster = await startCluster({ throwaway: true });

/**
 * @param {string} file
 * @param {(text: string) => string} change
 * @param {string[]} tests
 */
async function isNoticed(file, change, tests) {
	const path = join(copy, 'src/lib/server', file);
	const whole = readFileSync(path, 'utf8');
	const changed = change(whole);
	if (changed === whole) throw new Error(`The guard in ${file} is not written as this script expects.`);
	writeFileSync(path, changed);
	try {
		const { code } = await run(
			process.execPath,
			['node_modules/vitest/vitest.mjs', 'run', '--project', 'unit', '--project', 'database', ...tests],
			{
				cwd: copy,
				env: { ...process.env, HAIRSBREADTH_TEST_SERVER: cluster.url }
			}
		);
		return code !== 0;
	} finally {
		writeFileSync(path, whole);
	}
}

let missed = 0;
let count = 0;
/** @param {string} name @param {Promise<boolean>} noticed */
async function tell(name, noticed) {
	count += 1;
	const yes = await noticed;
	if (!yes) missed += 1;
	console.log(`${yes ? 'noticed' : 'MISSED '}  ${name}`);
}

const only = process.argv[2] ?? '';
try {
	const sound = await run(
		process.execPath,
		['node_modules/vitest/vitest.mjs', 'run', '--project', 'unit', '--project', 'database', ...FAST],
		{
			cwd: copy,
			env: { ...process.env, HAIRSBREADTH_TEST_SERVER: cluster.url }
		}
	);
	if (sound.code !== 0) throw new Error(`The tests fail as they are:\n${sound.output.slice(-3000)}`);
	for (const { file, from, to, tests = FAST } of guards) {
		if (!file.includes(only)) continue;
		await tell(
			`${file}: ${from.trim()}`,
			isNoticed(file, (text) => text.replace(from, () => to), tests)
		);
	}
	for (const { file, line } of administratorGuards()) {
		if (!file.includes(only)) continue;
		const without = (/** @type {string} */ text) =>
			text
				.split('\n')
				.filter((_one, index) => index !== line)
				.join('\n');
		await tell(`${file}: line ${line + 1}, requireAdministrator`, isNoticed(file, without, FAST));
	}
	console.log(`${count - missed} of ${count} missing guards were noticed.`);
	process.exitCode = missed === 0 ? 0 : 1;
} finally {
	await cluster.stop();
	rmSync(copy, { recursive: true, force: true });
}
