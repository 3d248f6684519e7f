import { SvelteMap } from 'svelte/reactivity';
import type { ScreeningRow } from '../../schemas/screening.ts';

/** Rows of a long list, fetched a window at a time as they come into sight. */

export const WINDOW = 100;

export interface RankedRow extends ScreeningRow {
	/** Number of the stated cell, for asking why. */
	cell: number;
}

export class RankedRows {
	total = $state(0);
	#windows = new SvelteMap<number, RankedRow[]>();
	/** Windows that were asked for. */
	#asked: Record<number, boolean> = {};
	#address = '';
	problem = $state('');

	/** Forgets what is there, for other results or another separation. */
	begin(address: string, total: number, first: readonly RankedRow[], from: number): void {
		this.#address = address;
		this.#asked = {};
		this.total = total;
		this.problem = '';
		this.#windows.clear();
		if (from % WINDOW !== 0) return;
		this.#windows.set(from / WINDOW, [...first]);
		this.#asked[from / WINDOW] = true;
	}

	at(index: number): RankedRow | undefined {
		return this.#windows.get(Math.floor(index / WINDOW))?.[index % WINDOW];
	}

	/** Asks for what stands between two places and is not there. */
	show(from: number, to: number): void {
		for (let window = Math.floor(from / WINDOW); window <= Math.floor(to / WINDOW); window += 1)
			if (!this.#asked[window] && window * WINDOW < Math.max(1, this.total)) void this.#fetch(window);
	}

	async #fetch(window: number): Promise<void> {
		const address = this.#address;
		this.#asked[window] = true;
		try {
			const answer = await fetch(`${address}&from=${window * WINDOW}&count=${WINDOW}`);
			if (!answer.ok) throw new Error(String(answer.status));
			const { rows, cells, total } = (await answer.json()) as {
				rows: ScreeningRow[];
				cells: number[];
				total: number;
			};
			if (address !== this.#address) return;
			this.total = total;
			const numbered = rows.map((row, place) => ({ ...row, cell: cells[place] }));
			this.#windows.set(window, numbered);
		} catch {
			if (address !== this.#address) return;
			this.#asked[window] = false;
			this.problem = 'Some rows could not be read; scroll again.';
		}
	}
}
