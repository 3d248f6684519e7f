import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { LaunchError } from './command.mjs';
import { mustRunAsServer } from './postgres-place.mjs';

export const DATABASE = 'hairsbreadth';
/** Owns the tables and migrates them. */
export const OWNER = 'hairsbreadth_owner';
/** What the running application signs in as: it reads and writes rows, but cannot touch tables or triggers. */
export const APPLICATION = 'hairsbreadth_app';

/**
 * How the superuser gets in: through the socket, by being the account of the server. There is no password for it.
 *
 * @typedef {object} Admin
 * @property {string} bin
 * @property {string} sockets
 * @property {number} port
 */

/** @typedef {{ application: string, owner: string }} Passwords */

/**
 * @param {string} place
 * @returns {Passwords}
 */
export function readPasswords(place) {
	const file = join(place, 'cluster-passwords.json');
	if (!existsSync(file)) {
		const passwords = {
			application: randomBytes(24).toString('hex'),
			owner: randomBytes(24).toString('hex')
		};
		writeFileSync(file, `${JSON.stringify(passwords)}\n`, { mode: 0o600 });
	}
	return JSON.parse(readFileSync(file, 'utf8'));
}

/**
 * Two roles and one database. Running it again changes nothing but the passwords, to those of the file.
 *
 * @param {Admin} admin
 * @param {Passwords | undefined} passwords
 */
export async function prepareRoles(admin, passwords) {
	const role = (/** @type {string} */ name, /** @type {string | undefined} */ password) => `
		select 'create role ${name}' where not exists (select from pg_roles where rolname = '${name}') \\gexec
		alter role ${name} with login nosuperuser nocreaterole nocreatedb noreplication${password ? ` password '${password}'` : ''};`;
	await sql(
		admin,
		'postgres',
		// A statement that fails is otherwise written to the log, with the password in it.
		`set log_min_error_statement = 'panic';
		${role(OWNER, passwords?.owner)}
		${role(APPLICATION, passwords?.application)}
		select 'create database ${DATABASE} owner ${OWNER}'
			where not exists (select from pg_database where datname = '${DATABASE}') \\gexec`
	);
	await sql(
		admin,
		DATABASE,
		`revoke all on schema public from public;
		grant all on schema public to ${OWNER};
		grant usage on schema public to ${APPLICATION};
		alter default privileges for role ${OWNER} in schema public grant select, insert, update, delete on tables to ${APPLICATION};
		alter default privileges for role ${OWNER} in schema public grant usage, select on sequences to ${APPLICATION};`
	);
}

/**
 * Refuses a kept cluster that could lose acknowledged work in a crash.
 *
 * @param {Admin} admin
 */
export async function checkDurability(admin) {
	const names = ['fsync', 'full_page_writes', 'synchronous_commit', 'data_checksums'];
	const answer = await sql(
		admin,
		DATABASE,
		names.map((name) => `select '${name}=' || current_setting('${name}');`).join('\n')
	);
	const off = names.filter((name) => !answer.includes(`${name}=on`));
	if (off.length > 0) {
		throw new LaunchError(
			`The database would lose work in a crash: ${off.join(', ')} must be on. ` +
				'Back it up, remove its folder and restore into the new one that the next start makes.'
		);
	}
}

/**
 * @param {Admin} admin
 * @param {string} database
 * @param {string} text
 */
async function sql({ bin, sockets, port }, database, text) {
	const where = ['-h', sockets, '-p', String(port), '-U', 'postgres', '-d', database];
	const quiet = ['-X', '-A', '-t', '-q', '-v', 'ON_ERROR_STOP=1'];
	return (await mustRunAsServer(join(bin, 'psql'), [...where, ...quiet], text)).stdout;
}
