import { staticPermittivity } from '../../engine/checks/static-permittivity.ts';
import type { PermittivityModel } from '../../engine/contract.ts';
import type { ResolvedVersion } from '../../schemas/version.ts';
import { staticLimit } from '../../study-sheet/conduction.ts';
import { shortCitation } from './citation.ts';
import type { VersionFacts } from '../../study-sheet/version-facts.ts';

/** What the page needs of a resolved version: everything but the model, which may be a long table. */

type Table = Extract<PermittivityModel, { kind: 'table' }>;
/** Shares of eps(i xi) - 1 that come from below, inside and above the measured points. */
export type SharesOf = (table: Table, xi: number) => { below: number; inside: number; above: number };

/** c/2d runs over these frequencies while the hairline goes from 1 mm to 0.1 nm. */
const XI_FROM = 1e11;
const XI_DECADES = 8;
const XI_PER_DECADE = 4;

/** The table of a model: itself, or the only one in a sum. */
function tableIn(model: PermittivityModel): Table | undefined {
	if (model.kind === 'table') return model;
	if (model.kind === 'temperatureDependent') return tableIn(model.of);
	return model.kind === 'sum' ? model.of.map(tableIn).find((table) => table !== undefined) : undefined;
}

function reliance(model: PermittivityModel, sharesOf: SharesOf): VersionFacts['reliance'] {
	const table = tableIn(model);
	if (!table) return null;
	const xiRadPerS = Array.from(
		{ length: XI_DECADES * XI_PER_DECADE + 1 },
		(_, index) => XI_FROM * 10 ** (index / XI_PER_DECADE)
	);
	return {
		xiRadPerS,
		outside: xiRadPerS.map((xi) => {
			const { below, above } = sharesOf(table, xi);
			return Number((below + above).toPrecision(4));
		})
	};
}

export function factsOf(version: ResolvedVersion, sharesOf: SharesOf): VersionFacts {
	const { ref, datasetTitle, checksum, quality, qualityReason, state, supersededBy, material, sources } =
		version;
	const [slug, number] = ref.split('@');
	return {
		...{ ref, number, datasetTitle, checksum, quality, qualityReason, state },
		material: { slug: material.slug, name: material.name, formula: material.formula, class: material.class },
		supersededBy:
			supersededBy === null || supersededBy.includes('@') ? supersededBy : `${slug}@${supersededBy}`,
		staticLimit: staticLimit(version.model),
		staticPermittivity: staticPermittivity(version.model),
		hazards: material.hazards && {
			codes: material.hazards.statements.map(({ code }) => code),
			texts: material.hazards.statements.map(({ text }) => text),
			signalWord: material.hazards.signalWord,
			caution: material.hazards.caution
		},
		measuredRangeEv: version.measuredRangeEv,
		sources: sources.map(shortCitation),
		reliance: reliance(version.model, sharesOf)
	};
}
