import { SPEED_OF_LIGHT, VACUUM_PERMITTIVITY } from './constants.ts';
import type { MaterialModel, SheetModel } from './contract.ts';
import { conducts, type StaticLimit } from './permittivity/susceptibility.ts';
import type { ZeroFrequencyMaterial } from './reflection/zero-frequency.ts';
import { radPerSFromEv } from './units.ts';

/** What a place has beyond an isotropic permittivity: another one along its normal, a sheet on its face to the gap. */

/** sigma(i xi)/(eps_0 c) of a conducting sheet, a pure number. */
export type Sheet = (xi: number) => number;

export interface Dress {
	/** Index of the substance along the normal of each place; that of the place itself where it is isotropic. */
	normals: number[];
	sheets: (Sheet | null)[];
}

export const isDressed = ({ normal, sheet }: MaterialModel): boolean =>
	normal !== undefined || sheet !== undefined;

const normals = new WeakMap<MaterialModel, MaterialModel>();

/** The material along the normal, the same object at each call: substances are recognised by it. */
export function normalOf(material: MaterialModel): MaterialModel {
	if (material.normal === undefined) return material;
	const known = normals.get(material) ?? {
		permittivity: material.normal.permittivity,
		...(material.permeability ? { permeability: material.permeability } : {})
	};
	normals.set(material, known);
	return known;
}

/** A sheet in SI: sigma constant, or falling like sigma_0/(1 + xi/gamma) (methods.md section 3). */
export function sheetOf(model: SheetModel | undefined): Sheet | null {
	if (model === undefined) return null;
	const still = model.siemens / (VACUUM_PERMITTIVITY * SPEED_OF_LIGHT);
	if (model.kind === 'constant') return () => still;
	const gamma = radPerSFromEv(model.dampingEv);
	return (xi) => (still * gamma) / (gamma + xi);
}

/**
 * A place at n = 0 with its dress (methods.md sections 2 to 4): fields of a uniaxial dielectric fall like sqrt(eps_p/eps_z) k
 * and it reflects like sqrt(eps_p eps_z); one that conducts in either direction, and a sheet of whatever conductivity,
 * reflects TM wholly and TE not at all.
 */
export function dressedAtZero(
	zero: ZeroFrequencyMaterial,
	normal: StaticLimit | null,
	sheet: boolean
): ZeroFrequencyMaterial {
	const covered = sheet ? { sheet: true } : {};
	if (normal === null || zero.order > 0 || zero.ideal) return { ...zero, ...covered };
	if (conducts(normal)) return { ...zero, order: 1, amplitude: 1, ...covered };
	const [plane, along] = [zero.amplitude, normal.finite];
	const product = (1 + plane) * (1 + along);
	return {
		...zero,
		amplitude: (plane + along + plane * along) / (1 + Math.sqrt(product)),
		stretch: Math.sqrt((1 + plane) / (1 + along)),
		...covered
	};
}
