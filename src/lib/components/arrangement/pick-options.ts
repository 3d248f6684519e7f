import type { MaterialDetail } from '../../schemas/material-detail.ts';
import type { MaterialSummary } from '../../schemas/material.ts';
import type { MaterialClass } from '../ui/hatch.ts';

/** What the material picker offers: the newest published version of every dataset that fits the search. */

export interface PickOption {
	ref: string;
	number: string;
	material: { slug: string; name: string; formula: string | null; class: MaterialClass };
	datasetTitle: string;
	quality: 'checked' | 'provisional';
	source: string;
	hazardous: boolean;
}

/** Short citation: the first two authors' family names and the year. */
function shortCitation({ authors, year }: { authors: readonly string[]; year: number | null }): string {
	const family = (author: string) =>
		author.includes(',') ? author.split(',')[0] : author.split(' ').slice(-1)[0];
	const names = authors.slice(0, 2).map(family).join(', ');
	return [authors.length > 2 ? `${family(authors[0])} et al.` : names, year ?? ''].filter(Boolean).join(' ');
}

export function optionsOf(material: MaterialDetail): PickOption[] {
	return material.datasets.flatMap(({ title, latest, versions }) => {
		const version = versions.find(({ number }) => number === latest);
		if (!version) return [];
		return [
			{
				ref: version.ref,
				number: version.number,
				material: {
					slug: material.slug,
					name: material.name,
					formula: material.formula,
					class: material.class
				},
				datasetTitle: title,
				quality: version.quality,
				source: version.sources.length > 0 ? shortCitation(version.sources[0]) : '',
				hazardous: material.hazards !== null
			}
		];
	});
}

const SHOWN_MATERIALS = 8;

/** Reads the library over its public address; a material once read is kept for as long as the page lives. */
export class MaterialSearch {
	#details = new Map<string, Promise<MaterialDetail>>();

	async #read<T>(address: string, signal?: AbortSignal): Promise<T> {
		const response = await fetch(address, { signal, headers: { accept: 'application/json' } });
		if (!response.ok) throw new Error(`${address} answered ${response.status}`);
		return (await response.json()) as T;
	}

	material(slug: string): Promise<MaterialDetail> {
		const known = this.#details.get(slug);
		if (known) return known;
		const asked = this.#read<{ material: MaterialDetail }>(
			`/api/v1/materials/${encodeURIComponent(slug)}`
		).then(({ material }) => material);
		this.#details.set(slug, asked);
		asked.catch(() => this.#details.delete(slug));
		return asked;
	}

	async find(text: string, signal: AbortSignal): Promise<PickOption[]> {
		const query = new URLSearchParams({ search: text.trim(), limit: '40' });
		const { materials } = await this.#read<{ materials: MaterialSummary[] }>(
			`/api/v1/materials?${query}`,
			signal
		);
		const usable = materials.filter(({ versionCount }) => versionCount > 0).slice(0, SHOWN_MATERIALS);
		const details = await Promise.all(usable.map(({ slug }) => this.material(slug)));
		return details.flatMap(optionsOf);
	}
}
