import type { ArrangementOf, BodyOf, MaterialModel } from './contract.ts';
import { plates } from './lifshitz/plates.ts';
import { substanceOf, systemOf, type Substance } from './system.ts';
import { materialAt } from './thermal-request.ts';
import { metresFromNm } from './units.ts';
import { checkRequest } from './validate.ts';

type Arrangement = ArrangementOf<MaterialModel>;

/** Values of eps(i xi) that one material keeps at most; knots of tables on the imaginary axis add frequencies. */
const KEPT_MAX = 20_000;

/** Bodies and medium by the places of their materials in the kernel's list; layers from the gap outwards. */
export interface ScreeningTriple {
	left: BodyOf<number>;
	medium: number;
	right: BodyOf<number>;
	/** Ions of the medium, as in an arrangement. */
	ions?: Pick<Arrangement, 'debyeLengthNm' | 'salt' | 'ions'>;
}

export interface ScreeningPressure {
	/** Pa; negative attracts. */
	pressurePa: number;
	/** Relative bound on the numerical error. */
	errorBound: number;
	met: boolean;
}

export interface ScreeningKernel {
	/**
	 * Pressures of one arrangement of plates, one a separation; the same bits in whatever order they are asked for.
	 *
	 * @throws Refusal where a request for the same arrangement would be refused, its paths those of the arrangement
	 */
	pressures(triple: ScreeningTriple, separationsNm: readonly number[]): ScreeningPressure[];
}

/**
 * Pressure alone of many arrangements of the same materials (methods.md sections 1 to 3 and 9). Frequencies depend on
 * temperature alone, so each material's eps(i xi) is computed once for all arrangements that it takes part in, and
 * without energy and gradient no logarithm is needed. The bound holds as it does for `evaluate`; values may differ from
 * its values within both bounds, because the pressure alone decides here how finely is computed.
 *
 * @param given             in the order that triples number them; one material under two zero-frequency rules stands twice
 * @param temperatureK      K, or 0
 * @param relativeAccuracy  of the pressure
 */
export function screeningKernel(
	given: readonly MaterialModel[],
	temperatureK: number,
	relativeAccuracy: number
): ScreeningKernel {
	const materials = given.map((material) => materialAt(material, temperatureK));
	const substances = new Map<MaterialModel, Substance>();
	const source = (material: MaterialModel): Substance => {
		const substance = substances.get(material) ?? remembering(substanceOf(material));
		substances.set(material, substance);
		return substance;
	};
	const named = ({ layers, substrate }: BodyOf<number>): BodyOf<MaterialModel> => ({
		layers: layers.map(({ of, thicknessNm }) => ({ of: materials[of], thicknessNm })),
		substrate: materials[substrate]
	});
	return {
		pressures({ left, medium, right, ions }, separationsNm) {
			const arrangement: Arrangement = {
				left: named(left),
				medium: materials[medium],
				right: named(right),
				shape: { kind: 'plates' },
				temperatureK,
				...ions
			};
			checkRequest({ arrangement, separationsNm: [...separationsNm], relativeAccuracy, include: [] });
			const evaluate = plates(systemOf({ arrangement }, source), relativeAccuracy, 'pressure');
			return separationsNm.map((separationNm) => {
				const { value, bound } = evaluate(metresFromNm(separationNm));
				const pressurePa = value[1];
				const errorBound = bound[1] === 0 ? 0 : Math.min(Number.MAX_VALUE, bound[1] / Math.abs(pressurePa));
				return { pressurePa, errorBound, met: errorBound <= relativeAccuracy };
			});
		}
	};
}

/** The same substance, whose eps(i xi) is computed once a frequency. */
function remembering(substance: Substance): Substance {
	const { chi } = substance;
	if (chi === null) return substance;
	const known = new Map<number, number>();
	return {
		...substance,
		chi: {
			...chi,
			atXi: (xi) => {
				const found = known.get(xi);
				if (found !== undefined) return found;
				const value = chi.atXi(xi);
				if (known.size >= KEPT_MAX) known.clear();
				known.set(xi, value);
				return value;
			}
		}
	};
}
