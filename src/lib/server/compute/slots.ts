/**
 * First come, first served access to a fixed number of places. Whoever waits can be called off without having
 * disturbed anything, which the queue of a thread pool does not offer: it ends the thread.
 */
export class Slots {
	#free: number;
	readonly #waiting: (() => void)[] = [];

	constructor(
		places: number,
		private readonly queueMax: number
	) {
		this.#free = places;
	}

	get waiting(): number {
		return this.#waiting.length;
	}

	/**
	 * @returns what gives the place back, to be called once; undefined when the queue is full
	 * @throws the reason of `signal` when it is called off while waiting
	 */
	async take(signal: AbortSignal): Promise<(() => void) | undefined> {
		signal.throwIfAborted();
		if (this.#free > 0) {
			this.#free -= 1;
			return () => this.#giveBack();
		}
		if (this.#waiting.length >= this.queueMax) return undefined;
		await new Promise<void>((resolve, reject) => {
			const callOff = () => {
				this.#waiting.splice(this.#waiting.indexOf(enter), 1);
				reject(signal.reason);
			};
			const enter = () => {
				signal.removeEventListener('abort', callOff);
				resolve();
			};
			signal.addEventListener('abort', callOff, { once: true });
			this.#waiting.push(enter);
		});
		return () => this.#giveBack();
	}

	#giveBack(): void {
		const next = this.#waiting.shift();
		if (next) next();
		else this.#free += 1;
	}
}
