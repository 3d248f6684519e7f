import type { PermittivityModel } from '../../engine/contract.ts';
import { permittivityOnImaginaryAxis, permittivityOnRealAxis } from '../../engine/permittivity/evaluator.ts';
import { epsilonSharesOf } from '../../engine/permittivity/table.ts';
import { radPerSFromEv } from '../../engine/units.ts';
import type { Spectrum } from '../../schemas/version.ts';
import { database, type Executor } from '../db/client.ts';
import { NotFound } from '../errors.ts';
import { resolve, givenTable } from './versions.ts';

/** Samples of a version for plots. Same version, same samples. */

/** rad/s: from below the microwave relaxations that matter to n = 0 only, up to where every solid has faded. */
const XI = { from: 1e11, to: 1e18, count: 211 };

/** eV; widened to the measured range where that goes further. */
const ENERGY = { from: 1e-3, to: 1e2, count: 501 };

/** Each sample of eps' is an integral over the table: a long one is thinned for the picture, its points stay whole. */
const ROWS_MAX = 600;

/** A published version never changes, so its samples are kept; the oldest make room. */
const KEPT_MAX = 300;
const kept = new Map<string, Spectrum>();

const logGrid = ({ from, to, count }: { from: number; to: number; count: number }): number[] =>
	Array.from({ length: count }, (_, index) => from * (to / from) ** (index / (count - 1)));

/** @throws NotFound where the ref names nothing that may be seen */
export async function spectrum(ref: string, executor: Executor = database()): Promise<Spectrum> {
	const found = (await resolve([ref], executor)).get(ref);
	if (!found) throw new NotFound(`There is no version "${ref}".`);
	const key = `${ref} ${found.checksum}`;
	const known = kept.get(key);
	if (known) return known;
	const [slug, number] = ref.split('@');
	const given = await givenTable(slug, number, executor);
	const sampled: Spectrum = {
		ref,
		measuredRangeEv: found.measuredRangeEv,
		imaginary: onImaginaryAxis(found.model),
		real: onRealAxis(thinned(found.model), found.measuredRangeEv),
		points: found.model.kind === 'table' && given ? pointsOf(found.model, given.epsilon1) : null
	};
	if (kept.size >= KEPT_MAX) kept.delete(kept.keys().next().value ?? '');
	kept.set(key, sampled);
	return sampled;
}

function thinned(model: PermittivityModel): PermittivityModel {
	if (model.kind !== 'table' || model.energiesEv.length <= ROWS_MAX) return model;
	const last = model.energiesEv.length - 1;
	const indices = Array.from({ length: ROWS_MAX }, (_, index) => Math.round((index * last) / (ROWS_MAX - 1)));
	return {
		...model,
		energiesEv: indices.map((index) => model.energiesEv[index]),
		epsilon2: indices.map((index) => model.epsilon2[index])
	};
}

export function onImaginaryAxis(model: PermittivityModel): Spectrum['imaginary'] {
	if (model.kind === 'idealConductor') return { xiRadPerS: [], epsilon: [], shares: null };
	const xiRadPerS = logGrid(XI);
	const shares = model.kind === 'table' ? xiRadPerS.map(epsilonSharesOf(model)) : null;
	return {
		xiRadPerS,
		epsilon: xiRadPerS.map(permittivityOnImaginaryAxis(model)),
		shares: shares && {
			below: shares.map(({ below }) => below),
			inside: shares.map(({ inside }) => inside),
			above: shares.map(({ above }) => above)
		}
	};
}

function onRealAxis(
	model: PermittivityModel,
	measured: { low: number; high: number } | null
): Spectrum['real'] {
	if (model.kind === 'idealConductor' || model.kind === 'imaginaryTable') return null;
	const at = permittivityOnRealAxis(model);
	const energies = logGrid({
		...ENERGY,
		from: Math.min(ENERGY.from, measured?.low || ENERGY.from),
		to: Math.max(ENERGY.to, measured?.high ?? ENERGY.to)
	});
	// Undamped oscillators have a pole that a grid point may hit.
	const samples = energies
		.map((energyEv) => ({ energyEv, ...at(radPerSFromEv(energyEv)) }))
		.filter(({ epsRe, epsIm }) => Number.isFinite(epsRe) && Number.isFinite(epsIm))
		.map(({ energyEv, epsRe, epsIm }) => ({ energyEv, epsRe, epsIm, ...refractiveIndex(epsRe, epsIm) }));
	return {
		energyEv: samples.map(({ energyEv }) => energyEv),
		epsilon1: samples.map(({ epsRe }) => epsRe),
		epsilon2: samples.map(({ epsIm }) => epsIm),
		n: samples.map(({ n }) => n),
		k: samples.map(({ k }) => k)
	};
}

/** n + i k = sqrt(eps), the smaller part from the larger one so that it keeps its digits. */
export function refractiveIndex(epsRe: number, epsIm: number): { n: number; k: number } {
	const larger = Math.sqrt((Math.hypot(epsRe, epsIm) + Math.abs(epsRe)) / 2);
	if (larger === 0) return { n: 0, k: 0 };
	const smaller = epsIm / (2 * larger);
	return epsRe >= 0 ? { n: larger, k: smaller } : { n: smaller, k: larger };
}

function pointsOf(
	model: Extract<PermittivityModel, { kind: 'table' }>,
	epsilon1: number[] | null
): Spectrum['points'] {
	const { energiesEv, epsilon2 } = model;
	const indices = epsilon1 ? epsilon1.map((re, index) => refractiveIndex(re, epsilon2[index])) : null;
	return {
		energyEv: energiesEv,
		epsilon1,
		epsilon2,
		n: indices && indices.map(({ n }) => n),
		k: indices && indices.map(({ k }) => k)
	};
}
