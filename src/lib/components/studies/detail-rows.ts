import type { BoundedFigure, ForcePoint, NonRetardedLimit } from '../../engine/contract.ts';
import { numberLine, percent } from '../../format/number.ts';

/** What is read off one separation beyond the curve itself, one row a figure and one cell a choice. */

export interface DetailRow {
	label: string;
	cells: string[];
}

export interface Detail {
	point: ForcePoint | undefined;
	nonRetarded: NonRetardedLimit | undefined;
}

const ZEPTOJOULE = 1e-21;
const DIGITS = 4;

/** A figure as far as its bound supports it; a dash where there is none. */
function written(
	figure: BoundedFigure | undefined,
	write: (value: number, digits: number) => string
): string {
	if (!figure || !(figure.errorBound < 1)) return '–';
	const supported = figure.errorBound === 0 ? DIGITS : Math.floor(-Math.log10(figure.errorBound));
	return write(figure.value, Math.max(1, Math.min(DIGITS, supported)));
}

const zeptojoules = (value: number, digits: number) => `${numberLine(value / ZEPTOJOULE, digits)} zJ`;
const plain = (value: number, digits: number) => numberLine(value, digits);

/** Rows whose figure at least one choice has; the numerical error of each lies below the last digit shown. */
export function detailRows(details: readonly Detail[]): DetailRow[] {
	const row = (
		label: string,
		figure: (detail: Detail) => BoundedFigure | undefined,
		write: (value: number, digits: number) => string
	): DetailRow => ({ label, cells: details.map((detail) => written(figure(detail), write)) });
	const rows = [
		row(
			'Effective Hamaker coefficient, from free energy',
			({ point }) => point?.analysis?.hamakerFromFreeEnergyJ,
			zeptojoules
		),
		row('the same, from pressure', ({ point }) => point?.analysis?.hamakerFromPressureJ, zeptojoules),
		row('its limit at short separations', ({ nonRetarded }) => nonRetarded?.hamakerJ, zeptojoules),
		row('Local exponent of free energy', ({ point }) => point?.analysis?.freeEnergyExponent, plain),
		row('of pressure', ({ point }) => point?.analysis?.pressureExponent, plain),
		row(
			'Pressure over ideal conductors at 0 K',
			({ point }) => point?.analysis?.ratioToIdeal.pressure,
			plain
		),
		row('over smooth surfaces', ({ point }) => point?.analysis?.roughnessFactor?.pressure, plain),
		row(
			'Thermal share of pressure',
			({ point }) => point?.terms?.thermalShare.pressure,
			(value, digits) => percent(value, { signed: true, digits })
		),
		{
			label: 'Standard uncertainty of pressure, from the data',
			cells: details.map(({ point }) => uncertaintyWords(point))
		}
	];
	return rows.filter(({ cells }) => cells.some((cell) => cell !== '–'));
}

function uncertaintyWords(point: ForcePoint | undefined): string {
	if (!point?.uncertainty || point.uncertainty.contributions.length === 0) return '–';
	return `±${percent(point.uncertainty.pressurePa.value / Math.abs(point.pressurePa), { digits: 2 })}`;
}

/** Why a choice has no limit at short separations. */
export const limitReasons = (details: readonly Detail[]): string[] => [
	...new Set(details.flatMap(({ nonRetarded }) => nonRetarded?.why ?? []))
];

/** Pressure of the terms n = 0..29 and of all others, as shares of the sum of magnitudes. */
export function termShares(point: ForcePoint): number[] {
	const series = point.terms?.pressurePa;
	if (!series) return [];
	const all = [...series.first, series.rest];
	const size = all.reduce((sum, one) => sum + Math.abs(one), 0);
	return size === 0 ? [] : all.map((one) => one / size);
}
