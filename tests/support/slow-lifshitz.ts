import type { ArrangementOf, MaterialModel, PermittivityModel } from '$lib/engine/contract.ts';
import { exponentialRule, gaussLegendre, onPanel, sumOfBlock } from './slow-lifshitz-quadrature.ts';
import {
	prepareArrangement,
	screenedExcess,
	settingAt,
	teExcess,
	tmExcess,
	type Medium,
	type PreparedArrangement,
	type Setting
} from './slow-lifshitz-reflection.ts';

/**
 * Free energy, pressure and gradient of plates by another road than the engine's: a sum over every n (or, closing
 * it, Euler-Maclaurin on Chebyshev blocks whose loss is measured), admittances instead of the recursion of reflection
 * coefficients, permittivities in 32 digits, Kramers-Kronig by series. Meant to be right before it is fast.
 */
export interface Triple {
	freeEnergy: number;
	pressure: number;
	pressureGradient: number;
}

export interface SlowForces {
	freeEnergyJPerM2: number;
	pressurePa: number;
	pressureGradientPaPerM: number;
	/** Sums of the absolute values of all terms. */
	magnitude: Triple;
	/** Absolute, in the units of the values. */
	estimatedError: Triple;
	/** Integrals over u computed. */
	evaluations: number;
}

export interface SlowOptions {
	/** Nodes of each panel in u. */
	nodes?: number;
	/** True: every Matsubara term by itself, no blocks. */
	everyTerm?: boolean;
}

const BOLTZMANN = 1.380649e-23;
const PLANCK = 6.62607015e-34;
const SPEED_OF_LIGHT = 299792458;

/** Rows hold F, P, G, their absolute sums, and what errors of tabulated contrasts make of these, without prefactors. */
const WIDTH = 9;

/** Terms are followed to y = 80: what is left is below e^-80 of the whole, whatever the materials. */
const LAST_PHASE = 80;

/** Terms n = 1..32 are always computed one by one; blocks need n far from 0. */
const FIRST_BLOCK = 33;

/** Rounding of one row relative to its absolute sum, times a margin; measured below 2e-15 against 38 digits, 2e-14 in sums of 10^4 terms. */
const ROUNDING = 2e-14;

const CHECK_NODES = 22;

/** Adds one polarization at one node. W are the admittance excesses of the bodies, `gap` the admittance of the gap. */
function addMode(
	row: Float64Array,
	y: number,
	weight: number,
	gap: number,
	left: number,
	right: number
): void {
	if (left === 0 || right === 0) return;
	const [p1, c1] = strength(gap, left);
	const [p2, c2] = strength(gap, right);
	const fall = Math.exp(-y);
	const attracts = left > 0 === right > 0;
	const product = attracts ? p1 * p2 : -p1 * p2;
	const scaled = product * fall;
	// 1 - R e^-y without loss where R and e^-y are near 1
	const denominator = attracts ? -Math.expm1(-y) + (c1 + p1 * c2) * fall : 1 - scaled;
	const f = weight * (Math.abs(scaled) < 0.5 ? Math.log1p(-scaled) : Math.log(denominator));
	const p = (-weight * y * scaled) / denominator;
	const g = (weight * y * y * scaled) / (denominator * denominator);
	row[0] += f;
	row[1] += p;
	row[2] += g;
	row[3] += Math.abs(f);
	row[4] += Math.abs(p);
	row[5] += Math.abs(g);
}

/** |r| and 1 - |r| of a body. */
function strength(gap: number, excess: number): [size: number, rest: number] {
	if (excess === Infinity) return [1, 0];
	const sum = 2 * gap + excess;
	return excess > 0 ? [excess / sum, (2 * gap) / sum] : [-excess / sum, (2 * (gap + excess)) / sum];
}

/** Distance in u from u = 0 of the nearest singularity: where kappa of the least dense layer vanishes. */
function nearestSingularity(setting: Setting): number {
	const { lowest } = setting;
	let least = lowest * lowest;
	for (const layer of [...setting.left, ...setting.right])
		if (!layer.tmMirror)
			least = Math.min(
				least,
				layer.tmShift,
				layer.normal ? (layer.tmShift * layer.normal.eps) / layer.eps : Infinity
			);
	return least / (lowest + Math.sqrt(Math.max(0, lowest * lowest - least)));
}

/** int u-rule at one frequency, both polarizations. */
function rowAt(setting: Setting, static_: boolean, nodes: number): Float64Array {
	const row = new Float64Array(WIDTH);
	const rule = panelRule(nodes);
	const { left, right, lowest } = setting;
	if (static_ && setting.screening > 0) {
		addScreened(row, setting, rule);
		const { nodes: us, weights } = exponentialRule(rule, 1e-9);
		for (let i = 0; i < us.length; i++)
			addTe(row, setting, left, right, us[i], us[i] ** 2, weights[i] * us[i]);
		return row;
	}
	const { nodes: us, weights } = exponentialRule(
		rule,
		static_ ? 1e-9 : Math.max(nearestSingularity(setting), 1e-8),
		setting.clearance
	);
	for (let i = 0; i < us.length; i++) {
		const u = us[i];
		const q = lowest + u;
		const kSquared = u * (u + 2 * lowest);
		const weight = weights[i] * q;
		addMode(
			row,
			q,
			weight,
			setting.eps / q,
			tmExcess(left, setting, q, kSquared),
			tmExcess(right, setting, q, kSquared)
		);
		addTe(row, setting, left, right, q, kSquared, weight);
	}
	return row;
}

function addTe(
	row: Float64Array,
	setting: Setting,
	left: readonly Medium[],
	right: readonly Medium[],
	q: number,
	kSquared: number,
	weight: number
): void {
	addMode(
		row,
		q,
		weight,
		q / setting.mu,
		teExcess(left, setting, q, kSquared),
		teExcess(right, setting, q, kSquared)
	);
}

/** Static TM term across ions, over s from the inverse Debye length, k dk = s ds; k is a square root at the start. */
function addScreened(row: Float64Array, setting: Setting, rule: ReturnType<typeof gaussLegendre>): void {
	const { nodes: us, weights } = exponentialRule(rule, 1e-16);
	for (let i = 0; i < us.length; i++) {
		const s = setting.screening + us[i];
		const k = Math.sqrt(us[i] * (us[i] + 2 * setting.screening));
		addMode(
			row,
			s,
			weights[i] * s,
			setting.eps * s,
			screenedExcess(setting.left, setting, s, k),
			screenedExcess(setting.right, setting, s, k)
		);
	}
}

const rules = new Map<number, ReturnType<typeof gaussLegendre>>();

function panelRule(nodes: number): ReturnType<typeof gaussLegendre> {
	const known = rules.get(nodes);
	if (known) return known;
	const made = gaussLegendre(nodes);
	rules.set(nodes, made);
	return made;
}

/** Frequencies (rad/s) where an interpolated eps(i xi) has a kink in its second derivative. */
function kinks(arrangement: ArrangementOf<MaterialModel>): number[] {
	const found = new Set<number>();
	const visit = (model: PermittivityModel) => {
		if (model.kind === 'imaginaryTable') model.frequenciesRadPerS.forEach((xi) => found.add(xi));
		if (model.kind === 'sum') model.of.forEach(visit);
		if (model.kind === 'temperatureDependent') visit(model.of);
		if (model.kind === 'maxwellGarnett' || model.kind === 'bruggeman')
			[model.host, model.inclusion].forEach(visit);
	};
	const { left, medium, right } = arrangement;
	const bodies = [left, right].flatMap(({ layers, substrate }) => [...layers.map(({ of }) => of), substrate]);
	for (const { permittivity, normal } of [medium, ...bodies]) {
		visit(permittivity);
		if (normal) visit(normal.permittivity);
	}
	return [...found].sort((a, b) => a - b);
}

/** Running total of rows with the loss of the rules that made them. */
interface Ledger {
	total: Float64Array;
	lost: Float64Array;
	/** Largest relative difference between the rule in u and a finer one, per component. */
	quadrature: Float64Array;
	evaluations: number;
}

function newLedger(): Ledger {
	return {
		total: new Float64Array(WIDTH),
		lost: new Float64Array(WIDTH),
		quadrature: new Float64Array(3),
		evaluations: 0
	};
}

interface Job {
	prepared: PreparedArrangement;
	distance: number;
	nodes: number;
	ledger: Ledger;
}

function rowOf(job: Job, xi: number, check: boolean): Float64Array {
	const setting = settingAt(job.prepared, xi, job.distance);
	const row = rowAt(setting, xi === 0, job.nodes);
	job.ledger.evaluations++;
	for (let c = 0; c < 3; c++) row[6 + c] = 2 * setting.contrastError * row[3 + c];
	if (check) {
		const finer = rowAt(setting, xi === 0, CHECK_NODES);
		for (let c = 0; c < 3; c++)
			if (finer[3 + c] > 0)
				job.ledger.quadrature[c] = Math.max(
					job.ledger.quadrature[c],
					Math.abs(row[c] - finer[c]) / finer[3 + c]
				);
	}
	return row;
}

function accumulate(ledger: Ledger, row: ArrayLike<number>, weight: number): void {
	for (let c = 0; c < WIDTH; c++) ledger.total[c] += weight * row[c];
}

/** Primed sum over n, in units of kT. */
function sumOverN(job: Job, firstFrequency: number, breaks: readonly number[], everyTerm: boolean): void {
	const { ledger } = job;
	accumulate(ledger, rowOf(job, 0, true), 0.5);
	const last = Math.max(1, Math.ceil((LAST_PHASE * SPEED_OF_LIGHT) / (2 * job.distance * firstFrequency)));
	const singly = everyTerm ? last : Math.min(last, FIRST_BLOCK - 1);
	for (let n = 1; n <= singly; n++)
		accumulate(ledger, rowOf(job, n * firstFrequency, (n & (n - 1)) === 0), 1);
	const marks = breaks.map((xi) => xi / firstFrequency);
	let from = singly + 1;
	while (from <= last) {
		const next = marks.find((mark) => mark > from);
		const to = Math.min(2 * from - 1, last, next === undefined ? Infinity : Math.max(from, Math.floor(next)));
		const check = from;
		const block = sumOfBlock((n) => rowOf(job, n * firstFrequency, n === check), from, to, WIDTH);
		rowOf(job, from * firstFrequency, true);
		accumulate(ledger, block.total, 1);
		for (let c = 0; c < WIDTH; c++) ledger.lost[c] += block.lost[c];
		from = to + 1;
	}
}

/** int d xi/(2 pi) at T = 0 on panels in ln xi, ends at the kinks; again with fewer nodes to see what is lost. */
function integrateOverXi(job: Job, breaks: readonly number[]): void {
	const { ledger } = job;
	const { clearance } = settingAt(job.prepared, SPEED_OF_LIGHT / job.distance, job.distance);
	const unit = SPEED_OF_LIGHT / (2 * job.distance * clearance);
	const [lowest, highest] = [unit * 1e-17, unit * LAST_PHASE];
	const marks = [lowest, ...breaks.filter((xi) => xi > lowest && xi < highest), highest];
	for (let i = 1; i < marks.length; i++) {
		const ratio = marks[i] / marks[i - 1];
		const panels = Math.ceil(Math.log(ratio) / Math.log(4) - 1e-9);
		for (let p = 0; p < panels; p++) {
			const [a, b] = [marks[i - 1] * ratio ** (p / panels), marks[i - 1] * ratio ** ((p + 1) / panels)];
			const full = panelOverXi(job, a, b, 14);
			// below 1e-6 of the unit a panel is too small to matter: no second look
			const coarse = b > unit * 1e-6 ? panelOverXi(job, a, b, 11) : full;
			accumulate(ledger, full, 1);
			for (let c = 0; c < WIDTH; c++) ledger.lost[c] += Math.abs(full[c] - coarse[c]);
		}
	}
}

function panelOverXi(job: Job, from: number, to: number, count: number): Float64Array {
	const { nodes, weights } = onPanel(panelRule(count), from, to, true);
	const sum = new Float64Array(WIDTH);
	for (let i = 0; i < nodes.length; i++) {
		const row = rowOf(job, nodes[i], i === 0 && count === 14);
		for (let c = 0; c < WIDTH; c++) sum[c] += weights[i] * row[c];
	}
	return sum;
}

export function slowForces(
	arrangement: ArrangementOf<MaterialModel>,
	separationNm: number,
	options: SlowOptions = {}
): SlowForces {
	const distance = separationNm * 1e-9;
	const job: Job = {
		prepared: prepareArrangement(arrangement),
		distance,
		nodes: options.nodes ?? 14,
		ledger: newLedger()
	};
	const breaks = kinks(arrangement);
	let energy: number;
	if (arrangement.temperatureK > 0) {
		energy = BOLTZMANN * arrangement.temperatureK;
		const firstFrequency = (4 * Math.PI ** 2 * energy) / PLANCK;
		sumOverN(job, firstFrequency, breaks, options.everyTerm ?? false);
	} else {
		energy = PLANCK / (4 * Math.PI ** 2);
		integrateOverXi(job, breaks);
	}
	const { total, lost, quadrature, evaluations } = job.ledger;
	const unit = energy / (8 * Math.PI * distance ** 2);
	const scales = [unit, unit / distance, unit / distance ** 2];
	const errors = scales.map(
		(scale, c) => scale * (lost[c] + total[6 + c] + total[3 + c] * (quadrature[c] + ROUNDING))
	);
	return {
		freeEnergyJPerM2: scales[0] * total[0],
		pressurePa: scales[1] * total[1],
		pressureGradientPaPerM: scales[2] * total[2],
		magnitude: {
			freeEnergy: scales[0] * total[3],
			pressure: scales[1] * total[4],
			pressureGradient: scales[2] * total[5]
		},
		estimatedError: { freeEnergy: errors[0], pressure: errors[1], pressureGradient: errors[2] },
		evaluations
	};
}
