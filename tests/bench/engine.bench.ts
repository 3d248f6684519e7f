import { cpus } from 'node:os';
import { estimateCost, evaluate, prepare } from '../../src/lib/engine/index.ts';
import { BENCH_CASES, GROWTH_CASES, type BenchCase } from './arrangements.ts';

/**
 * Microseconds a separation on one core, free energy, pressure and gradient together with their bounds. `warm` leaves
 * preparation and the first evaluation of eps(i xi) out, `cold` is one whole request from its JSON.
 */
const RUNS = 9;
const WARM_UP = 3;

const median = (values: number[]): number => values.sort((a, b) => a - b)[values.length >> 1];

/** Processor time of this process: other work on the machine does not count. */
function seconds(work: () => void): number {
	const start = process.cpuUsage();
	work();
	const { user, system } = process.cpuUsage(start);
	return (user + system) * 1e-6;
}

interface Figures {
	warm: number;
	cold: number;
	estimated: number;
	met: number;
}

function measure({ request }: BenchCase): Figures {
	const points = prepare(request).separationsNm.length;
	const warm: number[] = [];
	const cold: number[] = [];
	let met = 0;
	for (let run = 0; run < RUNS + WARM_UP; run++) {
		const whole = seconds(() => {
			evaluate(request);
		});
		const preparation = prepare(request);
		const all = (): void => {
			met = 0;
			for (let i = 0; i < points; i++) met += preparation.point(i).met ? 1 : 0;
		};
		all();
		const again = seconds(all);
		if (run < WARM_UP) continue;
		warm.push(again / points);
		cold.push(whole / points);
	}
	return {
		warm: median(warm),
		cold: median(cold),
		estimated: estimateCost(request).seconds / points,
		met: met / points
	};
}

function print(cases: BenchCase[]): void {
	console.log(
		'us a separation'.padEnd(36),
		'warm'.padStart(9),
		'cold'.padStart(9),
		'estimate'.padStart(9),
		'met'.padStart(6)
	);
	for (const one of cases) {
		const { warm, cold, estimated, met } = measure(one);
		const cells = [warm, cold, estimated].map((value) => (value * 1e6).toFixed(1).padStart(9));
		console.log(one.name.padEnd(36), ...cells, `${Math.round(100 * met)} %`.padStart(6));
	}
}

console.log(
	`${cpus()[0].model}, Node ${process.version}, processor time on one core, medians of ${RUNS} runs\n`
);
print(BENCH_CASES);
console.log();
print(GROWTH_CASES);
