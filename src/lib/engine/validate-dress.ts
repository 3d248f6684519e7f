import { materialsByPlace } from './analysis/places.ts';
import type { ForceRequest, MaterialModel } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import { susceptibility } from './permittivity/evaluator.ts';
import { conducts } from './permittivity/susceptibility.ts';
import type { Issue } from './refusal.ts';
import { checkRange } from './validate-number.ts';
import { permittivityIssues } from './validate-permittivity.ts';

/** Uniaxial bodies and conducting sheets: where they may stand, and what may be asked of them. */

export function checkDress(
	issues: Issue[],
	path: string,
	{ permittivity, normal, sheet }: MaterialModel
): void {
	const ideal = permittivity.kind === 'idealConductor';
	if (normal !== undefined) {
		if (ideal || normal.permittivity.kind === 'idealConductor') {
			issues.push({
				path: `${path}.normal`,
				message: 'an ideal conductor has no axis: give permittivities, or leave this out'
			});
		} else issues.push(...permittivityIssues(normal.permittivity, `${path}.normal.permittivity`));
	}
	if (sheet === undefined) return;
	if (ideal) issues.push({ path: `${path}.sheet`, message: 'vanishes on an ideal conductor: leave it out' });
	checkRange(issues, `${path}.sheet.siemens`, sheet.siemens, limits.sheetSiemens, 'S');
	if (sheet.kind === 'drude') {
		checkRange(issues, `${path}.sheet.dampingEv`, sheet.dampingEv, limits.bandEv, 'eV');
	}
}

export function checkPlainMedium(issues: Issue[], path: string, { normal, sheet }: MaterialModel): void {
	if (normal !== undefined)
		issues.push({ path: `${path}.normal`, message: 'the medium is isotropic here: leave this out' });
	if (sheet !== undefined)
		issues.push({
			path: `${path}.sheet`,
			message: 'a sheet lies on a body or on a layer, not in the medium'
		});
}

/** Two conductors that meet at n = 0 are told apart by their conductivities, which a sheet or an axis does not state. */
export function checkDressedBodies(issues: Issue[], arrangement: ForceRequest['arrangement']): void {
	for (const [place, { permittivity, normal, sheet }] of materialsByPlace(arrangement)) {
		if (place === 'medium') continue;
		const path = `arrangement.${place}`;
		const message = 'meets a medium that conducts: state debyeLengthNm, salt or ions for the medium instead';
		if (sheet !== undefined) issues.push({ path: `${path}.sheet`, message });
		if (normal === undefined || permittivity.kind === 'idealConductor') continue;
		if (permittivityIssues(permittivity, path).length > 0) continue;
		if (permittivityIssues(normal.permittivity, path).length > 0) continue;
		if ([permittivity, normal.permittivity].some((model) => conducts(susceptibility(model).atZero)))
			issues.push({ path: `${path}.normal`, message });
	}
}
