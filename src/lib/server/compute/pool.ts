import { MessageChannel, receiveMessageOnPort } from 'node:worker_threads';
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { ForceRequest } from '../../engine/contract.ts';
import { config } from '../config.ts';
import { InvalidInput } from '../errors.ts';
import { Cancelled, Unavailable } from '../limits/refusals.ts';
import type { Chunk, End, Message, Start, Task } from './messages.ts';
import { Slots } from './slots.ts';

/** Threads that run the engine, so that no computation ever holds up a request. */

const MEMORY_MB = 512;
/** Whatever the estimate said: after this a computation has gone wrong. */
const TIME_LIMIT_MS = 60_000;
/** A thread looks at its stop mark before each point; one that takes longer is ended. */
const STOP_GRACE_MS = 1000;
const QUEUE_MAX = 256;

export interface Progress {
	onStart: (start: Start) => void;
	onPoints: (chunk: Chunk) => void;
}

interface PoolOptions {
	threads: number;
	/** The thread's module. */
	task: string;
	timeLimitMs?: number;
}

export class EnginePool {
	readonly #threads: Piscina<Task, void>;
	readonly #slots: Slots;
	readonly #timeLimitMs: number;

	constructor({ threads, task, timeLimitMs = TIME_LIMIT_MS }: PoolOptions) {
		this.#timeLimitMs = timeLimitMs;
		this.#slots = new Slots(threads, QUEUE_MAX);
		this.#threads = new Piscina<Task, void>({
			filename: task,
			minThreads: threads,
			maxThreads: threads,
			// From source (development and tests) the thread reads TypeScript.
			execArgv: task.endsWith('.ts') ? ['--import', 'tsx'] : [],
			resourceLimits: { maxOldGenerationSizeMb: MEMORY_MB }
		});
		// Each run hears of its own failure; a thread that fails to start idle must not take the process along.
		this.#threads.on('error', () => undefined);
	}

	/** Computations that wait for a thread. */
	get waiting(): number {
		return this.#slots.waiting;
	}

	/**
	 * @param signal stops the work, within one point, when the caller goes away
	 * @throws InvalidInput where the engine refuses, or memory or time run out; Unavailable where too many wait;
	 *   Cancelled after `signal`
	 */
	async run(request: ForceRequest, progress: Progress, signal: AbortSignal): Promise<End> {
		const leave = await this.#slots.take(signal).catch(() => {
			throw new Cancelled();
		});
		if (!leave) {
			throw new Unavailable('busy', 'Too many computations are waiting; try again in a few seconds.', 5);
		}
		if (signal.aborted) {
			leave();
			throw new Cancelled();
		}
		const { port1: port, port2 } = new MessageChannel();
		const stop = new Int32Array(new SharedArrayBuffer(4));
		const kill = new AbortController();
		const worked = this.#threads.run(
			{ request, port: port2, stop },
			{ transferList: [port2], signal: kill.signal }
		);
		worked.catch(() => undefined).finally(leave);

		const timers: NodeJS.Timeout[] = [];
		let begun = false;
		let onAbort = () => {};
		let hear = (_message: Message) => {};
		const told = new Promise<End>((fulfil, reject) => {
			const halt = (why: Error) => {
				reject(why);
				Atomics.store(stop, 0, 1);
				// A thread that is still loading its module will see the mark as the first thing it does.
				const end = setTimeout(() => begun && kill.abort(), STOP_GRACE_MS);
				worked.catch(() => undefined).finally(() => clearTimeout(end));
			};
			onAbort = () => halt(new Cancelled());
			hear = (message) => {
				if (message.type === 'begun') {
					begun = true;
					timers.push(setTimeout(() => halt(tooLong(this.#timeLimitMs)), this.#timeLimitMs));
				} else if (message.type === 'start') progress.onStart({ separationsNm: message.separationsNm });
				else if (message.type === 'points') {
					progress.onPoints({ indices: message.indices, points: message.points });
				} else if (message.type === 'end') {
					const { type: _, ...end } = message;
					fulfil(end);
				} else if (message.type === 'refused') {
					reject(new InvalidInput('The engine cannot compute this request.', message.issues, 'refused'));
				}
			};
			port.on('message', hear);
		});
		signal.addEventListener('abort', onAbort, { once: true });
		try {
			return await Promise.race([
				told,
				worked.then(() => {
					// What the thread said last may still be under way when its end is known.
					for (let left = receiveMessageOnPort(port); left; left = receiveMessageOnPort(port))
						hear(left.message);
					return Promise.race([told, Promise.reject(new Error('the thread ended without an answer'))]);
				})
			]);
		} catch (error) {
			throw translated(error);
		} finally {
			signal.removeEventListener('abort', onAbort);
			timers.forEach(clearTimeout);
			port.close();
		}
	}

	/** Ends the threads; what still runs is dropped. */
	async close(): Promise<void> {
		await this.#threads.destroy();
	}
}

function tooLong(limitMs: number): InvalidInput {
	const limit = `${limitMs / 1000} s`;
	return new InvalidInput(
		`The computation was stopped after ${limit}.`,
		[
			{
				path: 'separationsNm',
				message: `takes longer than ${limit}: ask for fewer separations or less accuracy`
			}
		],
		'time-limit'
	);
}

function translated(error: unknown): unknown {
	if ((error as { code?: unknown }).code === 'ERR_WORKER_OUT_OF_MEMORY') {
		return new InvalidInput(
			`The computation needed more than the ${MEMORY_MB} MB it may use.`,
			[{ path: 'separationsNm', message: 'ask for fewer separations or fewer rows of data at once' }],
			'memory-limit'
		);
	}
	return error;
}

let shared: EnginePool | undefined;

/** The pool of this process; threads start with the first computation. */
export function enginePool(): EnginePool {
	shared ??= new EnginePool({ threads: config().threads, task: taskFile() });
	return shared;
}

export async function closeEnginePool(): Promise<void> {
	const open = shared;
	shared = undefined;
	await open?.close();
}

/** The built module stands at a fixed place below the folder that the application is started in. */
function taskFile(): string {
	const { engineTask } = config();
	if (engineTask) return resolve(engineTask);
	return import.meta.url.endsWith('.ts')
		? fileURLToPath(new URL('./task.ts', import.meta.url))
		: resolve('build/threads/engine-task.js');
}
