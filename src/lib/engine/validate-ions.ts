import type { ArrangementOf, MaterialModel } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import type { Issue } from './refusal.ts';
import { checkRange } from './validate-number.ts';

/** Mobile ions of the medium: one statement of how many, and a temperature at which they move. */
export function checkIons(issues: Issue[], arrangement: ArrangementOf<MaterialModel>): void {
	const { debyeLengthNm, salt, ions, temperatureK } = arrangement;
	const stated = (['debyeLengthNm', 'salt', 'ions'] as const).filter(
		(field) => arrangement[field] !== undefined
	);
	if (temperatureK === 0) {
		for (const field of stated)
			issues.push({
				path: `arrangement.${field}`,
				message: 'mobile ions need a temperature above 0 K: leave it out'
			});
	}
	if (debyeLengthNm !== undefined) {
		checkRange(issues, 'arrangement.debyeLengthNm', debyeLengthNm, limits.debyeLengthNm, 'nm');
	}
	if (salt !== undefined) {
		const path = 'arrangement.salt';
		checkRange(issues, `${path}.molPerL`, salt.molPerL, limits.molPerL, 'mol/L');
		if (
			checkRange(issues, `${path}.valence`, salt.valence, limits.valence) &&
			!Number.isInteger(salt.valence)
		)
			issues.push({ path: `${path}.valence`, message: 'must be a whole number' });
		if (salt.staticPermittivity !== undefined)
			checkRange(issues, `${path}.staticPermittivity`, salt.staticPermittivity, limits.constant);
		if (debyeLengthNm !== undefined)
			issues.push({ path, message: 'is given beside debyeLengthNm: one of the two says it all' });
	}
	if (ions === 'screened' && debyeLengthNm === undefined && salt === undefined) {
		issues.push({
			path: 'arrangement.ions',
			message: 'is "screened" without a length: give debyeLengthNm or salt'
		});
	}
}
