import { ROUGHNESS_RANGE_NM, SALT_RANGE_MOL_PER_L, UNCERTAINTY_RANGE, VALENCES } from './study-limits.ts';
import type { Study } from './study.ts';

/** Ions, roughness and assumed uncertainty in an address: `salt=0.01,1`, `ions=off`, `rough=1,0.5`, `uncertainty=0.05`. */

type Conditions = Pick<Study, 'debyeLengthNm' | 'salt' | 'ions' | 'roughness' | 'dataUncertainty'>;

const number = (text: string | undefined, { min, max }: { min: number; max: number }): number | undefined => {
	if (text === undefined || !/^\d+(\.\d+)?(e[+-]?\d+)?$/i.test(text)) return undefined;
	const value = Number(text);
	return value >= min && value <= max ? value : undefined;
};

function salt(text: string): Study['salt'] | string {
	const [concentration, charge, ...rest] = text.split(',');
	const molPerL = number(concentration, SALT_RANGE_MOL_PER_L);
	const valence = VALENCES.find((one) => String(one) === charge);
	return molPerL === undefined || valence === undefined || rest.length > 0
		? `"${text}" is not a concentration in mol/L and a valence, as 0.01,1`
		: { molPerL, valence };
}

function roughness(text: string): Study['roughness'] | string {
	const heights = text.split(',').map((one) => (one === '0' ? 0 : number(one, ROUGHNESS_RANGE_NM)));
	const [left, right] = heights;
	if (heights.length !== 2 || left === undefined || right === undefined || left + right === 0)
		return `"${text}" is not the rms of the left and of the right surface in nm, as 1,0.5`;
	return { ...(left > 0 ? { leftNm: left } : {}), ...(right > 0 ? { rightNm: right } : {}) };
}

/**
 * @param debyeLengthNm  as it was read already: of a length, a salt and `ions=off` the first one counts
 * @param report         told of every part that cannot be read or is left out
 */
export function decodeConditions(
	query: URLSearchParams,
	debyeLengthNm: number | undefined,
	report: (part: string, message: string) => void
): Conditions {
	const read = <T>(part: string, decode: (text: string) => T | string): T | undefined => {
		const text = query.get(part);
		if (text === null) return undefined;
		const value = decode(text);
		if (typeof value !== 'string') return value;
		report(part, `${value}; it was left out`);
		return undefined;
	};
	const salted = read('salt', salt);
	const off = read('ions', (text) => (text === 'off' ? { is: text } : `"${text}" is not off`));
	const stated = [
		debyeLengthNm === undefined ? {} : { debyeLengthNm },
		salted ? { salt: salted } : {},
		off ? { ions: 'off' as const } : {}
	].filter((one) => Object.keys(one).length > 0);
	if (stated.length > 1) report('ions', 'ions are stated twice; the first statement was taken');
	const rough = read('rough', roughness);
	const dataUncertainty = read(
		'uncertainty',
		(text) => number(text, UNCERTAINTY_RANGE) ?? `"${text}" is not a relative uncertainty, as 0.05`
	);
	return {
		...stated[0],
		...(rough ? { roughness: rough } : {}),
		...(dataUncertainty === undefined ? {} : { dataUncertainty })
	};
}
