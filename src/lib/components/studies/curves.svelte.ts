import type { Equilibrium, ForcePoint, NonRetardedLimit, Warning } from '../../engine/contract.ts';
import type { ForceRequestInput } from '../../schemas/force.ts';
import { computeForces, ForcesRefused } from './forces-stream.ts';

/** The running and finished computation of one model choice. What is shown stays until something newer is complete. */

export type CurveState = 'waiting' | 'computing' | 'complete' | 'failed';

export interface CurveProblem {
	message: string;
	issues: readonly { path: string; message: string }[];
	/** Seconds until the next attempt, which is made without asking. */
	retryAfter?: number;
}

/** Typing and dragging change the question many times a second; the server is asked when they pause. */
const PAUSE_MS = 120;

export class Curve {
	state = $state<CurveState>('waiting');
	points = $state.raw<(ForcePoint | undefined)[]>([]);
	/** The complete curve of the question before, drawn dimmed until the new one is complete. */
	previous = $state.raw<(ForcePoint | undefined)[]>([]);
	/** False from a new question to its first points: what is shown still answers the question before. */
	fresh = $state(true);
	computed = $state(0);
	total = $state(0);
	/** Shown from one second on: a count that flashes by helps nobody. */
	slow = $state(false);
	equilibria = $state.raw<Equilibrium[]>([]);
	warnings = $state.raw<Warning[]>([]);
	/** Where it was asked for. */
	nonRetarded = $state.raw<NonRetardedLimit>();
	engine = $state('');
	checksum = $state('');
	/** ISO, in UTC. */
	computedAt = $state('');
	problem = $state.raw<CurveProblem>();

	#question = '';
	#running = new AbortController();
	#pause: ReturnType<typeof setTimeout> | undefined;

	/** Asks unless this very question is already running or answered. */
	ask(request: ForceRequestInput, { keepPrevious = true } = {}): void {
		const question = JSON.stringify(request);
		if (question === this.#question) return;
		this.#question = question;
		if (this.state === 'complete' && keepPrevious) this.previous = this.points;
		if (!keepPrevious) this.points = [];
		this.fresh = false;
		this.cancel('computing');
		this.#pause = setTimeout(() => void this.#run(request), this.points.length === 0 ? 0 : PAUSE_MS);
	}

	/** Asks once more, whatever is known. */
	async again(): Promise<void> {
		const request = JSON.parse(this.#question) as ForceRequestInput;
		this.cancel('computing');
		await this.#run(request);
	}

	/** Forgets question and answer. */
	clear(): void {
		if (this.#question === '') return;
		this.cancel();
		this.#question = '';
		this.points = [];
		this.previous = [];
		this.problem = undefined;
		this.equilibria = [];
		this.warnings = [];
		this.checksum = '';
		this.fresh = true;
	}

	cancel(state: CurveState = 'waiting'): void {
		clearTimeout(this.#pause);
		this.#running.abort();
		this.slow = false;
		this.state = state;
	}

	async #run(request: ForceRequestInput): Promise<void> {
		const running = new AbortController();
		this.#running = running;
		const slowly = setTimeout(() => (this.slow = !running.signal.aborted), 1000);
		let points: (ForcePoint | undefined)[] = [];
		let computed = 0;
		this.computed = 0;
		try {
			const end = await computeForces(
				request,
				{
					start: ({ separationsNm, engine, inputChecksum }) => {
						points = new Array(separationsNm.length).fill(undefined);
						this.total = separationsNm.length;
						this.engine = engine;
						this.checksum = inputChecksum;
						this.problem = undefined;
					},
					points: (indices, arrived) => {
						indices.forEach((index, rank) => (points[index] = arrived[rank]));
						computed += indices.length;
						this.computed = computed;
						this.points = [...points];
						this.fresh = true;
					}
				},
				{ signal: running.signal }
			);
			this.equilibria = end.equilibria;
			this.warnings = end.warnings;
			this.nonRetarded = end.nonRetarded;
			this.computedAt = end.receivedAt;
			this.previous = [];
			this.state = 'complete';
		} catch (error) {
			if (running.signal.aborted) return;
			this.#fail(error, request);
		} finally {
			clearTimeout(slowly);
			if (this.#running === running) this.slow = false;
		}
	}

	#fail(error: unknown, request: ForceRequestInput): void {
		this.state = 'failed';
		this.points = [];
		this.previous = [];
		if (!(error instanceof ForcesRefused)) {
			this.problem = {
				message: 'The installation cannot be reached. Check the connection, then compute again.',
				issues: []
			};
			return;
		}
		this.problem = { message: error.message, issues: error.issues, retryAfter: error.retryAfter };
		if (error.retryAfter === undefined) return;
		this.#pause = setTimeout(() => {
			this.state = 'computing';
			void this.#run(request);
		}, error.retryAfter * 1000);
	}
}
