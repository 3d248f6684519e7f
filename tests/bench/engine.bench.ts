import { cpus } from 'node:os';
import { estimateCost, evaluate, permittivityOnImaginaryAxis, prepare } from '../../src/lib/engine/index.ts';
import { plates } from '../../src/lib/engine/lifshitz/plates.ts';
import { metresFromNm } from '../../src/lib/engine/units.ts';
import { systemOf } from '../../src/lib/engine/system.ts';
import { BENCH_CASES, GROWTH_CASES, tableOf, type BenchCase } from './arrangements.ts';
import { nestedQuadrature } from './nested-quadrature.ts';
import { screen, screeningMaterials } from './screening.ts';

/**
 * Microseconds a separation on one core, free energy, pressure and gradient together with their bounds. `warm` leaves
 * preparation and the first evaluation of eps(i xi) out, `cold` is one whole request from its JSON.
 */
const RUNS = 9;
const WARM_UP = 3;

/** Estimates further than this from what a request takes are remarked on. */
const MOST_OFF = 2;

const median = (values: number[]): number => values.sort((a, b) => a - b)[values.length >> 1];

/** Processor time of this process: other work on the machine does not count. */
function seconds(work: () => void): number {
	const start = process.cpuUsage();
	work();
	const { user, system } = process.cpuUsage(start);
	return (user + system) * 1e-6;
}

function medianSeconds(work: () => void): number {
	const times: number[] = [];
	for (let run = 0; run < RUNS + WARM_UP; run++) times.push(seconds(work));
	return median(times.slice(WARM_UP));
}

interface Figures {
	warm: number;
	cold: number;
	estimated: number;
	/** Integrands a separation: TE and TM count as two. */
	evaluations: number;
	met: number;
}

function measure({ request }: BenchCase): Figures {
	const { separationsNm, point } = prepare(request);
	const evaluatePlates = plates(systemOf(request), request.relativeAccuracy);
	const points = separationsNm.length;
	let met = 0;
	const warm = medianSeconds(() => {
		met = 0;
		for (let i = 0; i < points; i++) met += point(i).met ? 1 : 0;
	});
	return {
		warm: warm / points,
		cold: medianSeconds(() => void evaluate(request)) / points,
		estimated: estimateCost(request).seconds / points,
		evaluations:
			separationsNm.reduce((sum, d) => sum + evaluatePlates(metresFromNm(d)).evaluations, 0) / points,
		met: met / points
	};
}

function print(cases: BenchCase[]): void {
	const head = ['warm', 'cold', 'estimate', 'integrands'].map((name) => name.padStart(10));
	console.log('us a separation'.padEnd(36), ...head, 'met'.padStart(6));
	for (const one of cases) {
		const { warm, cold, estimated, evaluations, met } = measure(one);
		const cells = [warm, cold, estimated].map((value) => (value * 1e6).toFixed(1).padStart(10));
		const count = evaluations.toFixed(0).padStart(10);
		const ratio = estimated / cold;
		const remark =
			ratio < 1 / MOST_OFF || ratio > MOST_OFF ? `  estimate off by ${ratio.toPrecision(2)}` : '';
		console.log(one.name.padEnd(36), ...cells, count, `${Math.round(100 * met)} %`.padStart(6) + remark);
	}
}

/** All frequencies that a curve at 300 K from 10 nm asks for, of the finest rules. */
function printTable(): void {
	const xi = Array.from({ length: 160 }, (_, i) => 2.4678e14 * (1 + i) * 1.04 ** i);
	const model = tableOf(600);
	const time = medianSeconds(() => {
		const at = permittivityOnImaginaryAxis(model);
		for (const one of xi) at(one);
	});
	console.log(`table of 600 rows to ${xi.length} frequencies: ${(time * 1e3).toFixed(2)} ms`);
}

/** Pressure of triples of tabulated materials at five separations each, to 1e-6. */
function printScreening(): void {
	const bodies = 45;
	const materials = screeningMaterials(bodies, 10);
	for (const count of [1250, 2500, 5000, 10_000]) {
		let met = 0;
		const time = seconds(() => (met = screen(materials, bodies, count).met));
		const memory = `${Math.round(process.memoryUsage().rss / 1e6)} MB resident`;
		console.log(
			`${String(count).padStart(6)} triples: ${time.toFixed(2)} s, ${((time / count / 5) * 1e6).toFixed(0)} us a cell, ` +
				`${((100 * met) / count / 5).toFixed(1)} % met, ${memory}`
		);
	}
}

/** The same metals at 1e-8 by nested quadrature; how far the two are apart is printed beside. */
function printAgainst(): void {
	const { request } = BENCH_CASES[1];
	const epsilon = permittivityOnImaginaryAxis(request.arrangement.left.substrate.permittivity);
	const evaluatePlates = plates(systemOf(request), 1e-8);
	console.log(`${BENCH_CASES[1].name}: nested adaptive quadrature against the engine, us a separation`);
	for (const separationNm of [10, 100, 1000, 10_000]) {
		const d = metresFromNm(separationNm);
		const slow: number[] = [];
		let theirs: number[] = [];
		for (let run = 0; run < 4; run++)
			slow.push(seconds(() => (theirs = nestedQuadrature(epsilon, d, 300, 1e-8))));
		const fast = medianSeconds(() => {
			for (let i = 0; i < 100; i++) evaluatePlates(d);
		});
		const { value } = evaluatePlates(d);
		const apart = Math.max(...value.map((one, q) => Math.abs(theirs[q] / one - 1)));
		const [a, b] = [median(slow.slice(1)) * 1e6, fast * 1e4];
		console.log(
			`${String(separationNm).padStart(6)} nm: ${a.toFixed(0).padStart(8)} against ${b.toFixed(1).padStart(6)}, ` +
				`ratio ${(a / b).toFixed(0)}, apart ${apart.toExponential(1)}`
		);
	}
}

console.log(
	`${cpus()[0].model}, Node ${process.version}, processor time on one core, medians of ${RUNS} runs\n`
);
// The runtime compiles what is hot during the first case: one is measured for nothing.
for (let i = 0; i < 3; i++) measure(BENCH_CASES[1]);
print(BENCH_CASES);
console.log();
print(GROWTH_CASES);
console.log();
printTable();
printScreening();
if (process.argv.includes('--against')) {
	console.log();
	printAgainst();
}
