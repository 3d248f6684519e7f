import { evFromRadPerS } from '../../engine/units.ts';
import { epsilonAt, type EpsilonSeries } from './epsilon-curves.ts';
import { separationOfXi, wavelengthUmOfEnergy } from './frequency.ts';
import type { RealSeries } from './real-axis-data.ts';

/** The numbers behind a drawing, as columns for a table on the page and for a file. */

export interface Numbers {
	columns: string[];
	/** Row 2 of the file; empty for a dimensionless column. */
	units: string[];
	rows: number[][];
}

export function epsilonNumbers(series: readonly EpsilonSeries[]): Numbers {
	const xis = series[0]?.xiRadPerS ?? [];
	return {
		columns: ['xi', 'photon_energy', 'separation_c_over_2d', ...series.map((one) => `epsilon_${one.slug}`)],
		units: ['rad/s', 'eV', 'nm', ...series.map(() => '1')],
		rows: xis.map((xi) => [
			xi,
			evFromRadPerS(xi),
			separationOfXi(xi),
			...series.map((one) => epsilonAt(one, xi) ?? Number.NaN)
		])
	};
}

/** One dataset: its samples are its own, so several are not forced into one table. */
export function realNumbers({ real }: Pick<RealSeries, 'real'>): Numbers {
	return {
		columns: ['photon_energy', 'wavelength', 'n', 'k', 'epsilon_1', 'epsilon_2'],
		units: ['eV', 'um', '1', '1', '1', '1'],
		rows: real.energyEv.map((energy, index) => [
			energy,
			wavelengthUmOfEnergy(energy),
			real.n[index],
			real.k[index],
			real.epsilon1[index],
			real.epsilon2[index]
		])
	};
}

/** Six figures for reading; the file has all of them. */
export function shownRows(numbers: Numbers): string[][] {
	return numbers.rows.map((row) =>
		row.map((value) => (Number.isFinite(value) ? String(Number(value.toPrecision(6))) : ''))
	);
}

const quoted = (text: string) => (/[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** Names, then units, then figures that read back to the same values; where they come from stands above as comments. */
export function numbersCsv(numbers: Numbers, origin: readonly string[]): string {
	const lines = [
		...origin.map((line) => `# ${line.replaceAll(/[\r\n]+/g, ' ')}`),
		numbers.columns.map(quoted).join(','),
		numbers.units.join(','),
		...numbers.rows.map((row) => row.map((value) => (Number.isFinite(value) ? String(value) : '')).join(','))
	];
	return `${lines.join('\r\n')}\r\n`;
}
