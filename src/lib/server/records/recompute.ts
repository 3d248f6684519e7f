import { ENGINE_VERSION, estimateCost } from '../../engine/index.ts';
import type { ForcePoint } from '../../engine/contract.ts';
import { forceRequest } from '../../schemas/force.ts';
import type { Recomputation, RecordChoice, RecordContent } from '../../schemas/record.ts';
import { now } from '../clock.ts';
import { computeAfresh, planForces } from '../compute/forces.ts';

/** Computes a record again from its inputs, never from a result that was kept, and says what differs. */

type Quantity = readonly [
	name: 'free energy' | 'pressure' | 'pressure gradient' | 'force' | 'force gradient',
	value: (point: ForcePoint) => number | undefined,
	bound: (point: ForcePoint) => number
];

/** As in the answers of the engine; the bound of a force is the larger one of energy and pressure. */
const QUANTITIES: readonly Quantity[] = [
	['free energy', (point) => point.freeEnergyJPerM2, (point) => point.errorBound.freeEnergy],
	['pressure', (point) => point.pressurePa, (point) => point.errorBound.pressure],
	[
		'pressure gradient',
		(point) => point.pressureGradientPaPerM,
		(point) => point.errorBound.pressureGradient
	],
	[
		'force',
		(point) => point.forceN,
		(point) => Math.max(point.errorBound.freeEnergy, point.errorBound.pressure)
	],
	[
		'force gradient',
		(point) => point.forceGradientNPerM,
		(point) => Math.max(...Object.values(point.errorBound))
	]
];

type Compared = Pick<Recomputation, 'identical' | 'compared' | 'differing' | 'largest'>;

/** Number by number, at the same separations. */
export function compare(
	frozen: readonly Pick<RecordChoice, 'letter' | 'points'>[],
	again: readonly (readonly ForcePoint[])[]
): Compared {
	let compared = 0;
	let differing = 0;
	let largest: Recomputation['largest'] = null;
	frozen.forEach(({ letter, points }, index) => {
		points.forEach((before, place) => {
			const after = again[index][place];
			for (const [quantity, valueOf, boundOf] of QUANTITIES) {
				const [was, is] = [valueOf(before), valueOf(after)];
				if (was === undefined || is === undefined) continue;
				compared += 1;
				if (Object.is(was, is) && Object.is(boundOf(before), boundOf(after))) continue;
				differing += 1;
				const bounds = Math.abs(was) * boundOf(before) + Math.abs(is) * boundOf(after);
				const overBounds = was === is ? 0 : Math.min(Number.MAX_VALUE, Math.abs(is - was) / bounds);
				if (!largest || overBounds > largest.overBounds)
					largest = { letter, quantity, separationNm: before.separationNm, frozen: was, now: is, overBounds };
			}
		});
	});
	return { identical: differing === 0, compared, differing, largest };
}

/** @param charge told the seconds that it will take, before it begins */
export async function recompute(
	{ choices, engine, runtime }: RecordContent,
	{ charge, signal }: { charge: (seconds: number) => Promise<void>; signal: AbortSignal }
): Promise<Recomputation> {
	const plans = await Promise.all(choices.map(({ request }) => planForces(forceRequest.parse(request))));
	await charge(plans.reduce((sum, { request }) => sum + estimateCost(request).seconds, 0));
	const again: ForcePoint[][] = [];
	for (const plan of plans) again.push(await computeAfresh(plan, signal));
	return {
		...compare(choices, again),
		frozenWith: { engine, runtime },
		computedWith: { engine: ENGINE_VERSION, runtime: `node ${process.version}` },
		at: now().toISOString()
	};
}
