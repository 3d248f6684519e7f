import { z } from 'zod';
import type { PermittivityModel } from '../../engine/contract.ts';
import type { ForceChange, ModelDifference } from '../../schemas/comparison.ts';
import type { VersionDetail } from '../../schemas/version.ts';
import { InvalidInput } from '../errors.ts';
import { SEPARATIONS_NM, byImportance, forceChange, usualForceChanges } from './force-change.ts';
import { modelDifference } from './model-difference.ts';
import * as versions from './versions.ts';
import type { Viewer } from './viewer.ts';

/** Any two versions of any datasets, side by side. */

const separations = z
	.string()
	.max(200)
	.transform((text) =>
		text
			.split(/[\s,;]+/)
			.filter(Boolean)
			.map(Number)
	)
	.pipe(
		z
			.array(z.number({ error: 'separations in nm, as 5, 10, 100' }).min(0.5).max(100_000))
			.max(12, 'at most twelve separations')
	);

export const comparisonQuery = z.object({
	a: z.string().trim().max(120).default(''),
	b: z.string().trim().max(120).default(''),
	/** A version that stands on the other side, and one between; empty for the usual arrangements. */
	against: z.string().trim().max(120).default(''),
	across: z.string().trim().max(120).default(''),
	separations: separations.default([]),
	temperatureK: z.coerce.number().min(0).max(5000).default(300)
});
export type ComparisonQuery = z.infer<typeof comparisonQuery>;

export interface Comparison {
	first: VersionDetail;
	second: VersionDetail;
	difference: ModelDifference;
	changes: ForceChange[];
}

/** @throws InvalidInput naming the field whose version is not there, or not to be seen */
export async function compare(query: ComparisonQuery, viewer: Viewer | null): Promise<Comparison> {
	const [first, second] = await Promise.all([
		versionIn('a', query.a, viewer),
		versionIn('b', query.b, viewer)
	]);
	return {
		first,
		second,
		difference: modelDifference(first.model, second.model),
		changes: await changesOf(query, first, second, viewer)
	};
}

async function changesOf(
	query: ComparisonQuery,
	first: VersionDetail,
	second: VersionDetail,
	viewer: Viewer | null
): Promise<ForceChange[]> {
	if (!query.against && !query.across)
		return usualForceChanges(
			second.material.name.toLowerCase(),
			second.material.class,
			first.model,
			second.model
		);
	const against = query.against ? await versionIn('against', query.against, viewer) : null;
	const across = query.across ? await versionIn('across', query.across, viewer) : null;
	const name = second.material.name.toLowerCase();
	const vacuum: PermittivityModel = { kind: 'vacuum' };
	const arrangement =
		`${name} against ${against?.material.name.toLowerCase() ?? name}, ` +
		`across ${across?.material.name.toLowerCase() ?? 'vacuum'}, ${query.temperatureK} K`;
	const models = (x: PermittivityModel) => [x, across?.model ?? vacuum, against?.model ?? x];
	const at = query.separations.length > 0 ? query.separations : SEPARATIONS_NM;
	return [forceChange(arrangement, models(first.model), models(second.model), at, query.temperatureK)].sort(
		byImportance
	);
}

async function versionIn(path: string, ref: string, viewer: Viewer | null): Promise<VersionDetail> {
	const parts = versions.partsOf(ref);
	const none = () =>
		new InvalidInput('A version is not there.', [
			{ path, message: `there is no version "${ref}" to be seen; it reads gold-lorentz-drude@1.0` }
		]);
	if (!parts) throw none();
	try {
		return await versions.get(parts.slug, `${parts.major}.${parts.minor}`, undefined, viewer);
	} catch (error) {
		throw (error as Error).name === 'NotFound' ? none() : error;
	}
}
