import { z } from 'zod';
import type { UploadForm } from '$lib/schemas/upload-form.ts';
import type { UploadPreview } from '$lib/schemas/upload-preview.ts';

/** Saves a form as it is typed, one saving at a time, and keeps the last answer of what it reads as. */

export type SaveState = 'saved' | 'typing' | 'saving' | 'elsewhere' | 'away';

/** A saving begins this long after the last key, and not later than DELAY_MAX_MS after the first. */
const DELAY_MS = 700;
const DELAY_MAX_MS = 2000;
const RETRY_MS = 3000;

const saved = z.object({ revision: z.int(), savedAt: z.string(), preview: z.custom<UploadPreview>() });
const refused = z.object({ error: z.object({ message: z.string() }) });

export class Autosave {
	state = $state<SaveState>('saved');
	message = $state('');
	savedAt: string = $state('');
	revision: number = $state(0);
	preview: UploadPreview | null = $state.raw(null);

	#timer: ReturnType<typeof setTimeout> | undefined;
	#firstTyped = 0;
	#wanted = false;

	constructor(
		readonly address: string,
		readonly read: () => UploadForm,
		begin: { revision: number; savedAt: string; preview: UploadPreview }
	) {
		this.revision = begin.revision;
		this.savedAt = begin.savedAt;
		this.preview = begin.preview;
	}

	/** Something was typed. */
	typed(): void {
		if (this.state === 'elsewhere') return;
		if (this.state === 'saving') {
			this.#wanted = true;
			return;
		}
		const at = performance.now();
		if (this.state !== 'typing') this.#firstTyped = at;
		this.state = 'typing';
		clearTimeout(this.#timer);
		const left = Math.max(0, this.#firstTyped + DELAY_MAX_MS - at);
		this.#timer = setTimeout(() => void this.save(), Math.min(DELAY_MS, left));
	}

	/** Whether something typed is not saved yet. */
	get pending(): boolean {
		return this.state === 'typing' || this.state === 'saving' || this.state === 'away';
	}

	async save(): Promise<void> {
		clearTimeout(this.#timer);
		this.state = 'saving';
		this.#wanted = false;
		const body = JSON.stringify({ revision: this.revision, form: this.read() });
		try {
			const headers = { 'content-type': 'application/json' };
			const answer = await fetch(this.address, {
				method: 'PUT',
				headers,
				body,
				keepalive: body.length < 60_000
			});
			const content: unknown = await answer.json();
			if (answer.ok) {
				const { revision, savedAt, preview } = saved.parse(content);
				Object.assign(this, { revision, savedAt, preview, state: 'saved', message: '' });
			} else {
				this.message = refused.safeParse(content).data?.error.message ?? 'The server refused the form.';
				this.state = answer.status === 409 ? 'elsewhere' : 'away';
			}
		} catch {
			this.message = 'The server cannot be reached. What you typed stays here and is sent again.';
			this.state = 'away';
		}
		const now = this.state as SaveState;
		if (now === 'away') this.#timer = setTimeout(() => void this.save(), RETRY_MS);
		else if (this.#wanted && now === 'saved') this.typed();
	}

	stop(): void {
		clearTimeout(this.#timer);
	}

	/** The form goes to the server as a whole now: what is under way comes first, and nothing is sent beside it. */
	async handOver(): Promise<void> {
		this.stop();
		while (this.state === 'saving') await new Promise((resolve) => setTimeout(resolve, 20));
		this.stop();
		if (this.state !== 'elsewhere') this.state = 'saved';
	}
}
