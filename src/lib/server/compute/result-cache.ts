import type { ForcePoint } from '../../engine/contract.ts';
import type { Chunk, End, Start } from './messages.ts';
import { Cancelled } from '../limits/refusals.ts';
import type { Progress } from './pool.ts';

/**
 * Results by the checksum of what they follow from. Equal requests at the same time are computed once: who comes later
 * is told what is there already and follows. The work goes on as long as one of them is left.
 */

export interface Result extends Start, End {
	points: ForcePoint[];
}

export type Compute = (progress: Progress, signal: AbortSignal) => Promise<End>;

/** A point is a dozen numbers and their names; with a breakdown thrice that. */
const POINT_BYTES = 700;
const ENTRY_BYTES = 500;
/** A place's derivatives and kernel. */
const SENSITIVITY_BYTES = 12_000;

export class ResultCache {
	/** Least recently used first: a Map keeps the order of insertion. */
	readonly #finished = new Map<string, Result>();
	readonly #running = new Map<string, Running>();
	#bytes = 0;

	constructor(private readonly limitBytes: number) {}

	/** Whether the answer costs nothing any more. */
	has(key: string): boolean {
		return this.#finished.has(key) || this.#running.has(key);
	}

	/** @throws Cancelled after `signal`; whatever `compute` throws */
	async get(key: string, compute: Compute, progress: Progress, signal: AbortSignal): Promise<Result> {
		if (signal.aborted) throw new Cancelled();
		const finished = this.#finished.get(key);
		if (finished) {
			this.#finished.delete(key);
			this.#finished.set(key, finished);
			tellAll(finished, progress);
			return finished;
		}
		let running = this.#running.get(key);
		if (!running) {
			running = new Running(compute);
			this.#running.set(key, running);
			this.#keepWhenDone(key, running);
		}
		return running.follow(progress, signal, () => {
			// Nobody is left: the next who asks begins anew instead of joining what is being stopped.
			if (this.#running.get(key) === running) this.#running.delete(key);
		});
	}

	#keepWhenDone(key: string, running: Running): void {
		running.result
			.then((result) => this.#keep(key, result))
			.catch(() => undefined)
			.finally(() => {
				if (this.#running.get(key) === running) this.#running.delete(key);
			});
	}

	#keep(key: string, result: Result): void {
		const bytes = sizeOf(result);
		if (bytes > this.limitBytes || this.#finished.has(key)) return;
		this.#finished.set(key, result);
		this.#bytes += bytes;
		for (const [oldest, old] of this.#finished) {
			if (this.#bytes <= this.limitBytes) break;
			this.#finished.delete(oldest);
			this.#bytes -= sizeOf(old);
		}
	}
}

function sizeOf({ points: [first, ...rest] }: Result): number {
	if (!first) return ENTRY_BYTES;
	const parts = first.breakdown ? 3 : 1;
	const more = (first.sensitivity?.places.length ?? 0) * SENSITIVITY_BYTES;
	return ENTRY_BYTES + (1 + rest.length) * (POINT_BYTES * parts + more);
}

function tellAll({ separationsNm, points }: Result, progress: Progress): void {
	progress.onStart({ separationsNm });
	progress.onPoints({ indices: points.map((_, index) => index), points });
}

/** One computation and all who wait for it. */
class Running {
	readonly result: Promise<Result>;
	readonly #followers = new Set<Progress>();
	readonly #stop = new AbortController();
	#start: Start | undefined;
	readonly #arrived: Chunk = { indices: [], points: [] };

	constructor(compute: Compute) {
		this.result = compute(
			{
				onStart: (start) => {
					this.#start = start;
					for (const follower of this.#followers) follower.onStart(start);
				},
				onPoints: (chunk) => {
					this.#arrived.indices.push(...chunk.indices);
					this.#arrived.points.push(...chunk.points);
					for (const follower of this.#followers) follower.onPoints(chunk);
				}
			},
			this.#stop.signal
		).then((end) => ({ ...(this.#start ?? { separationsNm: [] }), points: this.#inOrder(), ...end }));
	}

	#inOrder(): ForcePoint[] {
		const points = new Array<ForcePoint>(this.#arrived.points.length);
		this.#arrived.indices.forEach((index, position) => (points[index] = this.#arrived.points[position]));
		return points;
	}

	async follow(progress: Progress, signal: AbortSignal, onLastGone: () => void): Promise<Result> {
		if (this.#start) progress.onStart(this.#start);
		if (this.#arrived.indices.length > 0) {
			progress.onPoints({ indices: [...this.#arrived.indices], points: [...this.#arrived.points] });
		}
		this.#followers.add(progress);
		let leave = () => {};
		const left = new Promise<never>((_, reject) => {
			leave = () => {
				this.#followers.delete(progress);
				if (this.#followers.size === 0) {
					onLastGone();
					this.#stop.abort();
				}
				reject(new Cancelled());
			};
		});
		signal.addEventListener('abort', leave, { once: true });
		try {
			return await Promise.race([this.result, left]);
		} finally {
			signal.removeEventListener('abort', leave);
			this.#followers.delete(progress);
		}
	}
}
