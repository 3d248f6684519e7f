import { z } from 'zod';

/** Saves the state of a study as it is worked on, one saving at a time; a state saved by somebody else is never overwritten. */

export type SaverState = 'saved' | 'waiting' | 'saving' | 'elsewhere' | 'away';

const DELAY_MS = 1500;
const RETRY_MS = 4000;

const answered = z.object({ revision: z.int(), savedAt: z.string() });
const refused = z.object({ error: z.object({ message: z.string() }) });

export class StudySaver {
	state = $state<SaverState>('saved');
	message = $state('');
	revision: number = $state(0);
	savedAt: string = $state('');

	#saved: string;
	#wanted: string;
	#timer: ReturnType<typeof setTimeout> | undefined;

	constructor(
		readonly address: string,
		begin: { revision: number; savedAt: string; query: string }
	) {
		this.revision = begin.revision;
		this.savedAt = begin.savedAt;
		this.#saved = begin.query;
		this.#wanted = begin.query;
	}

	/** The page is in this state now. */
	note(query: string): void {
		this.#wanted = query;
		if (this.state === 'saving' || this.state === 'elsewhere') return;
		clearTimeout(this.#timer);
		if (query === this.#saved) {
			this.state = 'saved';
			return;
		}
		this.state = 'waiting';
		this.#timer = setTimeout(() => void this.save(), DELAY_MS);
	}

	async save(): Promise<void> {
		clearTimeout(this.#timer);
		const query = this.#wanted;
		this.state = 'saving';
		this.state = await this.#send(query);
		if (this.state === 'away') this.#timer = setTimeout(() => void this.save(), RETRY_MS);
		else if (this.state === 'saved' && this.#wanted !== this.#saved) this.note(this.#wanted);
	}

	async #send(query: string): Promise<SaverState> {
		try {
			const answer = await fetch(this.address, {
				method: 'PUT',
				headers: { 'content-type': 'application/json' },
				body: JSON.stringify({ revision: this.revision, query }),
				keepalive: true
			});
			const content: unknown = await answer.json();
			if (answer.ok) {
				const { revision, savedAt } = answered.parse(content);
				this.revision = revision;
				this.savedAt = savedAt;
				this.#saved = query;
				this.message = '';
				return 'saved';
			}
			this.message = refused.safeParse(content).data?.error.message ?? 'The server refused the state.';
			return answer.status === 409 || answer.status === 403 || answer.status === 404 ? 'elsewhere' : 'away';
		} catch {
			this.message = 'The server cannot be reached; the study is saved as soon as it can be.';
			return 'away';
		}
	}

	/** On leaving: what waits is sent at once. */
	leave(): void {
		if (this.state === 'waiting') void this.save();
		else clearTimeout(this.#timer);
	}
}
