import type { BodyOf, ForceRequest, MaterialModel, Shape } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import { susceptibility } from './permittivity/evaluator.ts';
import { conducts } from './permittivity/susceptibility.ts';
import { Refusal, type Issue } from './refusal.ts';
import { ionsStated } from './system.ts';
import { checkDress, checkDressedBodies, checkPlainMedium } from './validate-dress.ts';
import { checkRange } from './validate-number.ts';
import { checkIons } from './validate-ions.ts';
import { checkExtras, checkUncertainty } from './validate-uncertainty.ts';
import { checkRoughness } from './validate-roughness.ts';
import { permittivityIssues } from './validate-permittivity.ts';

/**
 * Separations of a request in nm, in its own order.
 *
 * A range is spread evenly, or evenly in the logarithm, both ends included.
 */
export function separationsOf(separations: ForceRequest['separationsNm']): number[] {
	if (Array.isArray(separations)) return separations;
	const { from, to, count, spacing } = separations;
	if (count === 1) return [from];
	return Array.from({ length: count }, (_, i) => {
		if (i === count - 1) return to;
		const part = i / (count - 1);
		return spacing === 'log' ? from * Math.pow(to / from, part) : from + (to - from) * part;
	});
}

/**
 * Looks at everything the types cannot: ranges, order, passivity, and whether the statements fit the materials.
 *
 * @throws Refusal listing every problem with its path
 */
export function checkRequest(request: ForceRequest): void {
	const issues: Issue[] = [];
	const { arrangement } = request;
	checkRange(issues, 'relativeAccuracy', request.relativeAccuracy, limits.relativeAccuracy);
	checkSeparations(issues, request.separationsNm);
	checkBody(issues, 'arrangement.left', arrangement.left);
	checkBody(issues, 'arrangement.right', arrangement.right);
	checkShape(issues, arrangement.shape);
	if (arrangement.temperatureK !== 0) {
		checkRange(issues, 'arrangement.temperatureK', arrangement.temperatureK, limits.temperatureK, 'K (or 0)');
	}
	checkMedium(issues, request);
	checkExtras(issues, request);
	request.rivals?.forEach(({ of }, i) => checkMaterial(issues, `rivals[${i}].of`, of));
	checkRoughness(issues, request, separationsOf);
	if (issues.length > 0) throw new Refusal(issues);
}

function checkSeparations(issues: Issue[], separations: ForceRequest['separationsNm']): void {
	const path = 'separationsNm';
	if (Array.isArray(separations)) {
		if (separations.length === 0 || separations.length > limits.separations) {
			issues.push({
				path,
				message: `has ${separations.length} values; the engine takes 1 to ${limits.separations}`
			});
			return;
		}
		separations.forEach((value, i) => checkRange(issues, `${path}[${i}]`, value, limits.separationNm, 'nm'));
		return;
	}
	const from = checkRange(issues, `${path}.from`, separations.from, limits.separationNm, 'nm');
	const to = checkRange(issues, `${path}.to`, separations.to, limits.separationNm, 'nm');
	if (from && to && separations.count > 1 && separations.to <= separations.from) {
		issues.push({ path: `${path}.to`, message: `is ${separations.to} nm; it must lie above from` });
	}
	const whole = checkRange(issues, `${path}.count`, separations.count, { min: 1, max: limits.separations });
	if (whole && !Number.isInteger(separations.count)) {
		issues.push({ path: `${path}.count`, message: 'must be a whole number' });
	}
}

function checkBody(issues: Issue[], path: string, body: BodyOf<MaterialModel>): void {
	if (body.layers.length > limits.layers) {
		issues.push({
			path: `${path}.layers`,
			message: `has ${body.layers.length} layers; the engine takes up to ${limits.layers}`
		});
		return;
	}
	body.layers.forEach((layer, i) => {
		const at = `${path}.layers[${i}]`;
		checkRange(issues, `${at}.thicknessNm`, layer.thicknessNm, limits.thicknessNm, 'nm');
		checkMaterial(issues, `${at}.of`, layer.of);
	});
	checkMaterial(issues, `${path}.substrate`, body.substrate);
}

/** Whether the material conducts; null where the model is wrong or has no permittivity. */
function checkMaterial(issues: Issue[], path: string, material: MaterialModel): boolean | null {
	const found = permittivityIssues(material.permittivity, `${path}.permittivity`);
	issues.push(...found);
	checkPermeability(issues, path, material);
	checkDress(issues, path, material);
	if (found.length > 0) return null;
	checkUncertainty(issues, path, material);
	const rule = material.zeroFrequency;
	if (material.permittivity.kind === 'idealConductor') {
		if (rule !== undefined && rule !== 'ideal') {
			issues.push({
				path: `${path}.zeroFrequency`,
				message: 'an ideal conductor reflects ideally at every frequency: leave this out'
			});
		}
		return null;
	}
	const { atZero } = susceptibility(material.permittivity);
	if (rule === 'dcCounted') {
		if (conducts(atZero))
			issues.push({
				path: `${path}.zeroFrequency`,
				message: 'is "dcCounted" on a material that conducts already: leave it out'
			});
		return true;
	}
	if (rule === 'dcIgnored') {
		if (atZero.slope > 0 && atZero.plasmaSquared === 0) return false;
		issues.push({
			path: `${path}.zeroFrequency`,
			message: 'is "dcIgnored" on a material without a dc conductivity of its own: leave it out'
		});
		return conducts(atZero);
	}
	if (rule !== undefined && !conducts(atZero)) {
		issues.push({
			path: `${path}.zeroFrequency`,
			message: `is "${rule}" on a material that does not conduct: leave it out, or give the model a Drude, plasma or dcConductivity part`
		});
	} else if (rule === 'plasma' && atZero.plasmaSquared === 0) {
		issues.push({
			path: `${path}.zeroFrequency`,
			message: 'is "plasma", but a dc conductivity states no plasma frequency: use "drude", or a Drude part'
		});
	}
	return conducts(atZero);
}

function checkPermeability(
	issues: Issue[],
	path: string,
	{ permittivity, permeability }: MaterialModel
): void {
	if (permeability === undefined) return;
	if (permittivity.kind === 'idealConductor') {
		issues.push({ path: `${path}.permeability`, message: 'an ideal conductor has none: leave it out' });
		return;
	}
	checkRange(issues, `${path}.permeability.value`, permeability.value, limits.permeability);
	if (permeability.kind === 'debye') {
		const at = `${path}.permeability.relaxationTimePs`;
		checkRange(issues, at, permeability.relaxationTimePs, limits.relaxationTimePs, 'ps');
	}
}

function checkMedium(issues: Issue[], { arrangement }: ForceRequest): void {
	const { medium, temperatureK } = arrangement;
	const path = 'arrangement.medium';
	checkIons(issues, arrangement);
	if (medium.permittivity.kind === 'idealConductor') {
		issues.push({
			path: `${path}.permittivity`,
			message: 'nothing passes an ideal conductor: it cannot fill the gap'
		});
		return;
	}
	const conducting = checkMaterial(issues, path, medium);
	checkPlainMedium(issues, path, medium);
	if (conducting && !ionsStated(arrangement)) {
		checkCountedBodies(issues, arrangement);
		checkDressedBodies(issues, arrangement);
	}
	if (medium.zeroFrequency === 'dcCounted') {
		issues.push({
			path: `${path}.zeroFrequency`,
			message: 'what conducts in a medium are ions: state debyeLengthNm, salt or ions instead'
		});
	}
	if (medium.zeroFrequency === 'ideal') {
		issues.push({
			path: `${path}.zeroFrequency`,
			message: 'an ideally conducting medium carries no waves: use "drude" or "plasma"'
		});
	}
	if (conducting && temperatureK > 0 && medium.zeroFrequency === undefined && !ionsStated(arrangement)) {
		issues.push({
			path: `${path}.zeroFrequency`,
			message:
				'the medium conducts: state zeroFrequency for it, or debyeLengthNm, salt or ions if ions conduct'
		});
	}
}

/** How well a counted dielectric conducts is not stated: against a conducting medium its reflection is not known. */
function checkCountedBodies(issues: Issue[], arrangement: ForceRequest['arrangement']): void {
	for (const side of ['left', 'right'] as const) {
		const { layers, substrate } = arrangement[side];
		const path = `arrangement.${side}`;
		const places = [...layers.map(({ of }, i) => ({ of, at: `${path}.layers[${i}].of` }))];
		for (const { of, at } of [...places, { of: substrate, at: `${path}.substrate` }])
			if (of.zeroFrequency === 'dcCounted')
				issues.push({
					path: `${at}.zeroFrequency`,
					message:
						'is "dcCounted" in a medium that conducts too: give its model a dcConductivity part instead'
				});
	}
}

function checkShape(issues: Issue[], shape: Shape): void {
	for (const [name, value] of Object.entries(shape)) {
		if (name !== 'kind') checkRange(issues, `arrangement.shape.${name}`, value, limits.radiusUm, 'um');
	}
}
