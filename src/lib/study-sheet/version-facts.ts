import type { MaterialClass } from '../schemas/material.ts';
import type { StaticLimit } from './conduction.ts';

/** What the page says about a pinned version; the model itself stays on the server. */
export interface VersionFacts {
	ref: string;
	number: string;
	datasetTitle: string;
	material: { slug: string; name: string; formula: string | null; class: MaterialClass };
	checksum: string;
	quality: 'checked' | 'provisional';
	qualityReason: string | null;
	state: 'draft' | 'in_review' | 'published' | 'withdrawn';
	/** Full name of the version that supersedes it. */
	supersededBy: string | null;
	staticLimit: StaticLimit;
	/** eps(0) of the model; null where it conducts. */
	staticPermittivity: number | null;
	hazards: { codes: string[]; texts: string[]; signalWord: string | null; caution: string } | null;
	/** Energies between which the table was measured, eV; null for closed forms. */
	measuredRangeEv: { low: number; high: number } | null;
	/** Short citations. */
	sources: string[];
	/** Share of eps(i xi) - 1 that lies outside the measured table; null for closed forms, which have no table. */
	reliance: { xiRadPerS: number[]; outside: number[] } | null;
}

const ORDER = ['withdrawn', 'draft', 'in_review', 'published'] as const;

/** The state that a number resting on all of these must wear. */
export function worstState(facts: readonly VersionFacts[]): string {
	const worst = ORDER.find((state) => facts.some((version) => version.state === state)) ?? 'published';
	if (worst !== 'published') return worst.replace('_', ' ');
	return facts.some(({ quality }) => quality === 'provisional') ? 'provisional' : 'checked';
}

/** Share outside the table at one frequency, linear in log xi. */
export function relianceAt({ reliance }: VersionFacts, xi: number): number | undefined {
	if (!reliance) return undefined;
	const { xiRadPerS, outside } = reliance;
	const above = xiRadPerS.findIndex((value) => value >= xi);
	if (above < 0) return outside[outside.length - 1];
	if (above === 0) return outside[0];
	const t = Math.log(xi / xiRadPerS[above - 1]) / Math.log(xiRadPerS[above] / xiRadPerS[above - 1]);
	return outside[above - 1] + t * (outside[above] - outside[above - 1]);
}
