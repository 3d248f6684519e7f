import type { PermittivityModel, ZeroFrequencyRule } from '../engine/contract.ts';

/** What the static term of a material is where the arrangement says nothing: the limit of its model as written. */
export type StaticLimit = Exclude<ZeroFrequencyRule, 'dcCounted' | 'dcIgnored'> | 'finite';

const RANK: readonly StaticLimit[] = ['finite', 'plasma', 'drude', 'ideal'];

/** Any part that conducts with losses makes the sum conduct with losses; without losses it is a plasma. */
const strongest = (limits: StaticLimit[]): StaticLimit =>
	limits.reduce((one, other) => (RANK.indexOf(other) > RANK.indexOf(one) ? other : one), 'finite');

export function staticLimit(model: PermittivityModel): StaticLimit {
	switch (model.kind) {
		case 'idealConductor':
			return 'ideal';
		case 'plasma':
			return 'plasma';
		case 'drude':
			return model.dampingEv === 0 ? 'plasma' : 'drude';
		case 'dcConductivity':
			return model.siemensPerM === 0 ? 'finite' : 'drude';
		case 'lorentz':
			return strongest(
				model.terms.map(({ energyEv, dampingEv, strengthEv2 }) => {
					if (energyEv > 0 || strengthEv2 === 0) return 'finite';
					return dampingEv === 0 ? 'plasma' : 'drude';
				})
			);
		case 'table':
			return model.lowEnd.kind === 'drude' || model.lowEnd.kind === 'plasma' ? model.lowEnd.kind : 'finite';
		case 'temperatureDependent':
			return staticLimit(model.of);
		case 'maxwellGarnett':
		case 'bruggeman':
			return mixtureLimit(model);
		case 'sum':
			return strongest(model.of.map(staticLimit));
		default:
			return 'finite';
	}
}

/** A phase conducts through a mixture as its host, or in Bruggeman's from a third of the volume on. */
function mixtureLimit(
	model: Extract<PermittivityModel, { kind: 'maxwellGarnett' | 'bruggeman' }>
): StaticLimit {
	const { host, inclusion, fraction } = model;
	if (fraction === 0) return staticLimit(host);
	if (fraction === 1) return staticLimit(inclusion);
	const [ofHost, ofInclusion] = [staticLimit(host), staticLimit(inclusion)];
	const both = ofHost !== 'finite' && ofInclusion !== 'finite';
	const through = [
		...(both || model.kind === 'maxwellGarnett' || 3 * (1 - fraction) > 1 ? [ofHost] : []),
		...(both || (model.kind === 'bruggeman' && 3 * fraction > 1) ? [ofInclusion] : [])
	];
	return strongest(through);
}

/**
 * Rules that may stand at a place: a conductor's prescriptions, or for a dielectric whether its dc conductivity counts. In the
 * medium ions are what conducts, and those are stated with the conditions.
 */
export function rulesFor(limit: StaticLimit, slot: string): ZeroFrequencyRule[] {
	if (limit !== 'finite') return ['drude', 'plasma', 'ideal'];
	return slot === 'medium' ? [] : ['dcCounted'];
}

/** The rule in words; "as written" is never left unsaid. */
export function ruleWords(limit: StaticLimit | ZeroFrequencyRule): string {
	switch (limit) {
		case 'drude':
			return 'Drude';
		case 'plasma':
			return 'plasma';
		case 'ideal':
			return 'ideal conductor';
		case 'finite':
			return 'finite';
		case 'dcCounted':
			return 'dc conductivity counted';
		case 'dcIgnored':
			return 'dc conductivity left out';
	}
}
