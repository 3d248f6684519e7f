import type { ForcePoint } from '../engine/contract.ts';

/** Computed curves by column, for notebooks and tables: every quantity of every model choice with its bound. */

export interface Column {
	/** As `pressure_A` or `pressure_bound_A`. */
	name: string;
	unit: string;
	/** One a separation; null where this choice has none there. */
	values: (number | null)[];
}

export interface CurveColumns {
	/** Where the numbers come from, a line each. */
	provenance: string[];
	columns: Column[];
}

interface Answered {
	letter: string;
	points: readonly (ForcePoint | undefined)[];
}

type Read = (point: ForcePoint) => number | undefined;

/** Quantity, unit, value, and the relative bound, which has no unit. */
const QUANTITIES: readonly [string, string, Read, Read][] = [
	['free_energy', 'J/m^2', (point) => point.freeEnergyJPerM2, (point) => point.errorBound.freeEnergy],
	['pressure', 'Pa', (point) => point.pressurePa, (point) => point.errorBound.pressure],
	[
		'pressure_gradient',
		'Pa/m',
		(point) => point.pressureGradientPaPerM,
		(point) => point.errorBound.pressureGradient
	],
	[
		'force',
		'N',
		(point) => point.forceN,
		(point) => Math.max(point.errorBound.freeEnergy, point.errorBound.pressure)
	]
];

/** @param forceUnit N, or N/m for the shapes whose force is one per length */
export function curveColumns(
	choices: readonly Answered[],
	forceUnit: 'N' | 'N/m',
	provenance: readonly string[]
): CurveColumns {
	const separations = [
		...new Set(choices.flatMap(({ points }) => points.flatMap((point) => point?.separationNm ?? [])))
	].sort((a, b) => a - b);
	const columns: Column[] = [{ name: 'separation', unit: 'nm', values: separations }];
	for (const { letter, points } of choices) {
		const at = new Map(points.flatMap((point) => (point ? [[point.separationNm, point] as const] : [])));
		for (const [name, unit, value, bound] of QUANTITIES) {
			const read = (of: Read) =>
				separations.map((separation) => {
					const point = at.get(separation);
					return point && value(point) !== undefined ? (of(point) ?? null) : null;
				});
			const values = read(value);
			if (values.every((one) => one === null)) continue;
			columns.push({ name: `${name}_${letter}`, unit: name === 'force' ? forceUnit : unit, values });
			columns.push({ name: `${name}_bound_${letter}`, unit: '1', values: read(bound) });
		}
	}
	return { provenance: [...provenance], columns };
}

const quoted = (text: string) => (/[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

/** Comment lines, a row of names, a row of units, rows. Numbers read back to the same double. */
export function columnsCsv({ provenance, columns }: CurveColumns): string {
	const rows = columns[0].values.map((_, row) => columns.map(({ values }) => String(values[row] ?? '')));
	return [
		...provenance.map((line) => `# ${line.replace(/\s+/g, ' ')}`),
		columns.map(({ name }) => quoted(name)).join(','),
		columns.map(({ unit }) => unit).join(','),
		...rows.map((row) => row.join(',')),
		''
	].join('\r\n');
}

/** `{ provenance, units: { name: unit }, columns: { name: [...] } }`: a table in one line of any notebook. */
export function columnsJson({ provenance, columns }: CurveColumns): string {
	return `${JSON.stringify(
		{
			provenance,
			units: Object.fromEntries(columns.map(({ name, unit }) => [name, unit])),
			columns: Object.fromEntries(columns.map(({ name, values }) => [name, values]))
		},
		null,
		1
	)}\n`;
}
