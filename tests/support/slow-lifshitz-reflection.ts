import type { ArrangementOf, BodyOf, MaterialModel, SheetModel } from '$lib/engine/contract.ts';
import {
	electricSusceptibility,
	imaginaryFrequency,
	magneticSusceptibility,
	permittivityDifference,
	slowMaterial,
	type SlowMaterial,
	type TermCache
} from './slow-lifshitz-permittivity.ts';

/**
 * Reflection by admittances (methods.md, section 3): Y = eps/kappa for TM, kappa/mu for TE, carried from the substrate
 * to the gap as the difference W = Y - Y_gap, so that nothing is lost where body and medium are nearly alike.
 * With W, r_TM = W/(2 Y_gap + W) and r_TE = -W/(2 Y_gap + W). Lengths are in units of 2d, wave numbers of 1/(2d).
 */

/** One layer or substrate at one frequency. */
export interface Medium {
	/** eps_j - eps_m; Infinity where the layer screens completely. */
	difference: number;
	eps: number;
	mu: number;
	muDifference: number;
	/** (eps_j - eps_m) (2d xi/c)^2 in TE; at n = 0 the plasma term. */
	teContrast: number;
	/** kappa_j^2 - k^2 in TM and TE. */
	tmShift: number;
	teShift: number;
	tmMirror: boolean;
	teMirror: boolean;
	/** Along the normal of a uniaxial layer. */
	normal: { eps: number; difference: number } | null;
	/** What a sheet in front adds to the admittances. */
	tmSheet: number;
	teSheet: number;
	/** thickness/d, so that kappa t = kappa * ratio/2; Infinity for the substrate. */
	ratio: number;
}

/** Everything of the arrangement that the integral over u needs at one frequency. */
export interface Setting {
	left: Medium[];
	right: Medium[];
	eps: number;
	mu: number;
	/** 2d q at k = 0. */
	lowest: number;
	/** (2d xi/c)^2 */
	phaseSquared: number;
	/** 2d/(Debye length) at n = 0, else 0. */
	screening: number;
	/** Relative error of the contrasts, from tables that were subtracted in doubles. */
	contrastError: number;
	/** Width of all that is like the medium, in units of d: the gap and outer layers of the medium's own material. */
	clearance: number;
}

/** Layers that do not reflect, counted from the gap. */
function unseen(body: readonly Medium[]): number {
	let sum = 0;
	for (const { difference, muDifference, normal, tmSheet, teSheet, ratio } of body) {
		const seen = difference !== 0 || muDifference !== 0 || normal !== null || tmSheet !== 0 || teSheet !== 0;
		if (seen || ratio === Infinity) return sum;
		sum += ratio;
	}
	return sum;
}

interface SlowPlace {
	of: SlowMaterial;
	normal: SlowMaterial | null;
	sheet: SheetModel | undefined;
	thickness: number;
}

interface PreparedBody {
	layers: SlowPlace[];
}

export interface PreparedArrangement {
	left: PreparedBody;
	medium: SlowMaterial;
	right: PreparedBody;
	debyeLength: number | undefined;
}

function prepareBody(body: BodyOf<MaterialModel>, kelvin: number): PreparedBody {
	const place = (material: MaterialModel, thickness: number): SlowPlace => ({
		of: slowMaterial(material, kelvin),
		normal: material.normal
			? slowMaterial({ ...material, permittivity: material.normal.permittivity }, kelvin)
			: null,
		sheet: material.sheet,
		thickness
	});
	const layers = body.layers.map((layer) => place(layer.of, layer.thicknessNm * 1e-9));
	return { layers: [...layers, place(body.substrate, Infinity)] };
}

export function prepareArrangement(arrangement: ArrangementOf<MaterialModel>): PreparedArrangement {
	return {
		left: prepareBody(arrangement.left, arrangement.temperatureK),
		medium: slowMaterial(arrangement.medium, arrangement.temperatureK),
		right: prepareBody(arrangement.right, arrangement.temperatureK),
		debyeLength: arrangement.debyeLengthNm === undefined ? undefined : arrangement.debyeLengthNm * 1e-9
	};
}

const SPEED_OF_LIGHT = 299792458;
const EPSILON_VACUUM = 8.8541878188e-12;

/** What a sheet adds: sigma/(eps_0 xi) to eps/kappa and mu_0 sigma xi to kappa/mu, lengths in units of 2d. */
function sheetAdmittances(
	sheet: SheetModel | undefined,
	xi: number,
	distance: number
): { tmSheet: number; teSheet: number } {
	if (sheet === undefined) return { tmSheet: 0, teSheet: 0 };
	if (xi === 0) return { tmSheet: Infinity, teSheet: 0 };
	const fall = sheet.kind === 'constant' ? 1 : 1 + xi / (sheet.dampingEv * EV_TO_RAD_PER_S);
	const sigma = sheet.siemens / fall;
	return {
		tmSheet: sigma / (EPSILON_VACUUM * xi * 2 * distance),
		teSheet: (sigma * xi * 2 * distance) / (EPSILON_VACUUM * SPEED_OF_LIGHT ** 2)
	};
}
const EV_TO_RAD_PER_S = (1.602176634e-19 * 2 * Math.PI) / 6.62607015e-34;

/** The setting at imaginary frequency xi; xi = 0 takes the zero-frequency rules. */
export function settingAt(prepared: PreparedArrangement, xi: number, distance: number): Setting {
	const frequency = imaginaryFrequency(xi);
	const cache: TermCache = new Map();
	const { medium } = prepared;
	const eps = 1 + electricSusceptibility(medium, frequency, cache);
	const muChi = magneticSusceptibility(medium.permeability, xi);
	const mu = 1 + muChi;
	const phaseSquared = ((2 * distance * xi) / SPEED_OF_LIGHT) ** 2;
	let contrastError = 0;
	const place = ({ of, normal, sheet, thickness }: SlowPlace): Medium => {
		const layerMuChi = magneticSusceptibility(of.permeability, xi);
		const layerMu = 1 + layerMuChi;
		const muDifference = layerMuChi - muChi;
		const ratio = thickness / distance;
		const shared = {
			mu: layerMu,
			muDifference,
			ratio,
			normal: null,
			...sheetAdmittances(sheet, xi, distance)
		};
		if (of.ideal || (xi === 0 && (of.zero.conducts || normal?.zero.conducts))) {
			const plasma =
				xi === 0 ? of.zero.plasmaEnergySquared * ((EV_TO_RAD_PER_S * 2 * distance) / SPEED_OF_LIGHT) ** 2 : 0;
			const mirror = of.ideal || of.zero.mirror;
			return {
				...shared,
				difference: Infinity,
				eps: Infinity,
				teContrast: plasma,
				tmShift: 0,
				teShift: layerMu * plasma,
				tmMirror: true,
				teMirror: mirror
			};
		}
		const difference = permittivityDifference(of, medium, frequency, cache);
		if (difference.value !== 0)
			contrastError = Math.max(contrastError, difference.error / Math.abs(difference.value));
		const along = normal && {
			eps: 1 + electricSusceptibility(normal, frequency, cache),
			...permittivityDifference(normal, medium, frequency, cache)
		};
		if (along && along.value !== 0)
			contrastError = Math.max(contrastError, along.error / Math.abs(along.value));
		const layerEps = 1 + electricSusceptibility(of, frequency, cache);
		const shift = layerEps * layerMu * phaseSquared;
		return {
			...shared,
			normal: along && { eps: along.eps, difference: along.value },
			difference: difference.value,
			eps: layerEps,
			teContrast: difference.value * phaseSquared,
			tmShift: shift,
			teShift: shift,
			tmMirror: false,
			teMirror: false
		};
	};
	const left = prepared.left.layers.map(place);
	const right = prepared.right.layers.map(place);
	return {
		left,
		right,
		eps,
		mu,
		lowest: Math.sqrt(eps * mu * phaseSquared),
		phaseSquared,
		screening: xi === 0 && prepared.debyeLength !== undefined ? (2 * distance) / prepared.debyeLength : 0,
		contrastError,
		clearance: 1 + unseen(left) + unseen(right)
	};
}

/**
 * W of a stack from the W of what lies behind a layer: with Y_1 = Y_0 + a, Y_2 = Y_0 + b and t = tanh(kappa thickness),
 * Y_1 (Y_2 + Y_1 t)/(Y_1 + Y_2 t) - Y_0 = [b (Y_0 (1 - t) + a) + a t (2 Y_0 + a)]/(Y_1 + Y_2 t).
 */
function throughLayer(gap: number, a: number, b: number, phase: number): number {
	const t = Math.tanh(phase);
	const fall = Math.exp(-2 * phase);
	const oneLessT = (2 * fall) / (1 + fall);
	if (b === Infinity) return (gap * oneLessT + a) / t;
	return (b * (gap * oneLessT + a) + a * t * (2 * gap + a)) / (gap + a + (gap + b) * t);
}

const tmKappa = ({ normal, eps, tmShift }: Medium, kSquared: number): number =>
	Math.sqrt((normal ? eps / normal.eps : 1) * kSquared + tmShift);

/** eps_p/kappa - eps_m/q with kappa^2 = (eps_p/eps_z) k^2 + eps_p mu x, over the sum of the two. */
function uniaxialExcess(
	{ eps, difference, muDifference }: Medium,
	normal: { eps: number; difference: number },
	setting: Setting,
	q: number,
	kSquared: number,
	kappa: number
): number {
	const electric = (kSquared * (normal.eps * difference + setting.eps * normal.difference)) / normal.eps;
	const magnetic =
		setting.eps * setting.phaseSquared * (difference * setting.mu - setting.eps * muDifference);
	return (eps * (electric + magnetic)) / ((eps * q + setting.eps * kappa) * kappa * q);
}

/** W in TM at wave number k, q = sqrt(k^2 + lowest^2) in the gap. */
export function tmExcess(stack: readonly Medium[], setting: Setting, q: number, kSquared: number): number {
	const gap = setting.eps / q;
	let excess = 0;
	for (let j = stack.length - 1; j >= 0; j--) {
		const layer = stack[j];
		if (layer.tmMirror) {
			excess = Infinity;
			continue;
		}
		const kappa = tmKappa(layer, kSquared);
		const a = layer.normal
			? uniaxialExcess(layer, layer.normal, setting, q, kSquared, kappa)
			: (layer.difference * (q * kappa + kSquared) -
					setting.eps * layer.eps * layer.muDifference * setting.phaseSquared) /
				((kappa + q) * kappa * q);
		excess = layer.ratio === Infinity ? a : throughLayer(gap, a, excess, (kappa * layer.ratio) / 2);
		excess += layer.tmSheet;
	}
	return excess;
}

export function teExcess(stack: readonly Medium[], setting: Setting, q: number, kSquared: number): number {
	const gap = q / setting.mu;
	let excess = 0;
	for (let j = stack.length - 1; j >= 0; j--) {
		const layer = stack[j];
		if (layer.teMirror) {
			excess = Infinity;
			continue;
		}
		const kappa = Math.sqrt(kSquared + layer.teShift);
		const product = layer.mu * setting.mu;
		const a =
			(product * layer.teContrast - layer.muDifference * (q * kappa + kSquared)) / ((kappa + q) * product);
		excess = layer.ratio === Infinity ? a : throughLayer(gap, a, excess, (kappa * layer.ratio) / 2);
		excess += layer.teSheet;
	}
	return excess;
}

/**
 * W of the screened static TM term (methods.md, section 2): the potential falls like s = sqrt(k^2 + screening^2) in the
 * gap and like k in the bodies, and the admittance is eps times that.
 */
export function screenedExcess(stack: readonly Medium[], setting: Setting, s: number, k: number): number {
	const gap = setting.eps * s;
	let excess = 0;
	for (let j = stack.length - 1; j >= 0; j--) {
		const layer = stack[j];
		if (layer.tmMirror) {
			excess = Infinity;
			continue;
		}
		const kappa = tmKappa(layer, k * k);
		const mean = layer.normal ? Math.sqrt(layer.eps * layer.normal.eps) : layer.eps;
		const difference = layer.normal
			? (layer.normal.eps * layer.difference + setting.eps * layer.normal.difference) / (mean + setting.eps)
			: layer.difference;
		const a = difference * k - (setting.eps * setting.screening ** 2) / (s + k);
		excess = layer.ratio === Infinity ? a : throughLayer(gap, a, excess, (kappa * layer.ratio) / 2);
		excess += layer.tmSheet;
	}
	return excess;
}
