import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { describe, expect, it } from 'vitest';

/** Runs a stack in a process of its own; `work` is the text of its body. */
async function runIn(
	work: string,
	signal?: NodeJS.Signals
): Promise<{ code: number | null; lines: string[] }> {
	const script = `
		const { runStack } = await import(${JSON.stringify(new URL('./stack.mjs', import.meta.url).href)});
		const { LaunchError } = await import(${JSON.stringify(new URL('./command.mjs', import.meta.url).href)});
		await runStack(async ({ onStop, asked, interrupted, atEnd }) => {
			onStop(() => console.log('first stopped'));
			onStop(() => console.log('second stopped'));
			${work}
		}, 130);`;
	const environment = { ...process.env, npm_lifecycle_event: '' };
	const child = spawn(process.execPath, ['--input-type=module', '-e', script], { env: environment });
	let output = '';
	child.stderr.resume();
	child.stdout.setEncoding('utf8').on('data', (text: string) => {
		output += text;
		if (signal && output.includes('ready\n')) child.kill(signal);
	});
	const [code] = await once(child, 'close');
	return { code, lines: output.trim().split('\n') };
}

describe('runStack', () => {
	it('stops in the reverse order and says its last words after that', async () => {
		const { code, lines } = await runIn(`atEnd(() => console.log('counted'));`);
		expect(lines).toEqual(['second stopped', 'first stopped', 'counted']);
		expect(code).toBe(0);
	});

	it.each([
		['an error for the person', `throw new LaunchError('do this');`],
		['an accident', `throw new TypeError('oops');`],
		['a failure that the work has counted', `process.exitCode = 1;`],
		['something that does not stop', `onStop(() => { throw new Error('stuck'); });`]
	])('ends with 1 after %s, everything else stopped', async (_what, work) => {
		const { code, lines } = await runIn(work);
		expect(code).toBe(1);
		expect(lines).toEqual(['second stopped', 'first stopped']);
	});

	it.each(['SIGINT', 'SIGTERM', 'SIGHUP'] as const)('stops in order on %s', async (signal) => {
		const { code, lines } = await runIn(
			`const timer = setInterval(() => {}, 1000); console.log('ready'); await asked; clearInterval(timer);`,
			signal
		);
		expect(code).toBe(130);
		expect(lines).toEqual(['ready', 'second stopped', 'first stopped']);
	});
});
