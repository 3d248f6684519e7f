import type { Annotation, Data, Layout, LayoutAxis } from 'plotly.js-dist-min';
import { numberLine } from '../../format/number.ts';
import { ENERGY, quantityLine } from '../../format/quantity.ts';
import { spreadLabels } from '../../study-sheet/curve-data.ts';
import {
	abscissaOf,
	PANELS,
	pointColumns,
	shownRange,
	splitAtRange,
	valueRange,
	type Abscissa,
	type Columns,
	type Panels,
	type RealQuantity,
	type RealSeries
} from './real-axis-data.ts';
import { signedLog, signedTicks } from './signed-log.ts';

/** The real-axis spectra as a figure for the plotting package: two panels over one axis, dressed in the tokens alone. */

export interface FigureTheme {
	ink: string;
	muted: string;
	edge: string;
	rule: string;
	page: string;
	/** Of the inks 1 to 5. */
	series: readonly string[];
}

export interface FigureSize {
	width: number;
	height: number;
}

const MARGIN = { t: 8, r: 30, b: 46, l: 64 };
/** Share of the height of each panel; the rest parts them. */
const PANEL_SHARE = 0.47;
const LABEL_SPACING = 14;
/** Absorption below this share of the largest is noise of the models and would only stretch the axis. */
const DECADES_SHOWN = 6;

const NAMES: Record<RealQuantity, string> = { n: 'n', k: 'k', epsilon1: 'ε′', epsilon2: 'ε″' };

interface PanelScale {
	/** From a value to the axis of the figure. */
	place(value: number): number;
	low: number;
	high: number;
	tickvals: number[];
	ticktext: string[];
	log: boolean;
}

const powerText = (power: number) =>
	power === 0 ? '1' : power === 1 ? '10' : `10<sup>${String(power).replace('-', '−')}</sup>`;

function panelScale(series: readonly RealSeries[], quantity: RealQuantity): PanelScale {
	const found = valueRange(series, quantity, shownRange(series)) ?? { low: 0.1, high: 10 };
	if (quantity === 'epsilon1') {
		const [low, high] = [Math.min(found.low, 0), Math.max(found.high, 1)];
		const room = 0.04 * (signedLog(high) - signedLog(low));
		const ticks = signedTicks(low, high);
		return {
			place: signedLog,
			low: signedLog(low) - room,
			high: signedLog(high) + room,
			tickvals: ticks.map((tick) => tick.at),
			ticktext: ticks.map((tick) => tick.text),
			log: false
		};
	}
	const high = Math.log10(Math.max(found.high, 1e-3)) + 0.15;
	const low = Math.max(Math.log10(Math.max(found.low, 1e-12)) - 0.1, high - DECADES_SHOWN);
	const step = high - low > 5 ? 2 : 1;
	const powers = Array.from(
		{ length: Math.floor(high) - Math.ceil(low) + 1 },
		(_, index) => Math.ceil(low) + index
	);
	const kept = powers.filter((power) => power % step === 0);
	return {
		place: (value) => value,
		low,
		high,
		tickvals: kept.map((power) => 10 ** power),
		ticktext: kept.map(powerText),
		log: true
	};
}

function tracesOf(
	series: readonly RealSeries[],
	quantity: RealQuantity,
	panel: number,
	scale: PanelScale,
	abscissa: Abscissa,
	theme: FigureTheme
): Data[] {
	const unit = abscissa === 'energy' ? 'eV' : 'µm';
	const trace = (one: RealSeries, columns: Columns, look: Partial<Data>): Data =>
		({
			type: 'scatter',
			xaxis: 'x',
			yaxis: panel === 0 ? 'y' : 'y2',
			x: columns.energyEv.map((energy) => abscissaOf(energy, abscissa)),
			y: columns.values.map(scale.place),
			customdata: columns.values.map((value) => numberLine(value, 4)),
			hovertemplate: `<b>${one.letter}</b> %{x:.4~g} ${unit}: ${NAMES[quantity]} = %{customdata}<extra></extra>`,
			...look
		}) as Data;

	return series.flatMap((one) => {
		const color = theme.series[one.ink - 1];
		const parts = splitAtRange(one, quantity);
		const points = pointColumns(one, quantity);
		const dashed = { mode: 'lines', line: { color, width: 1.6, dash: 'dot' } } as Partial<Data>;
		return [
			...[parts.below, parts.above]
				.filter((columns) => columns.energyEv.length > 0)
				.map((columns) => trace(one, columns, dashed)),
			...(parts.measured.energyEv.length > 0
				? [trace(one, parts.measured, { mode: 'lines', line: { color, width: 2.4 } } as Partial<Data>)]
				: []),
			...(points === null
				? []
				: [
						trace(one, points, {
							mode: 'markers',
							marker: { color, size: 4, symbol: 'circle-open' }
						} as Partial<Data>)
					])
		];
	});
}

/** A letter at the right end of each curve, moved apart where they meet. */
function endLetters(
	series: readonly RealSeries[],
	quantity: RealQuantity,
	panel: number,
	scale: PanelScale,
	abscissa: Abscissa,
	theme: FigureTheme,
	plotHeight: number
): Partial<Annotation>[] {
	const shown = shownRange(series);
	const top = panel === 0 ? 0 : (1 - PANEL_SHARE) * plotHeight;
	const height = PANEL_SHARE * plotHeight;
	const wanted = series.map(({ real }) => {
		const indices = real.energyEv.flatMap((energy, index) =>
			energy >= shown.low && energy <= shown.high ? [index] : []
		);
		const index = (abscissa === 'energy' ? indices[indices.length - 1] : indices[0]) ?? 0;
		const placed = scale.place(real[quantity][index]);
		const share =
			((scale.log ? Math.log10(Math.max(placed, 1e-300)) : placed) - scale.low) / (scale.high - scale.low);
		return top + (1 - Math.min(1, Math.max(0, share))) * height;
	});
	const places = spreadLabels(wanted, LABEL_SPACING, top + 6, top + height - 2);
	return series.map(({ letter, ink }, index) => ({
		text: `<b>${letter}</b>`,
		xref: 'paper',
		yref: 'paper',
		x: 1,
		xanchor: 'left',
		xshift: 6,
		y: 1 - places[index] / plotHeight,
		yanchor: 'middle',
		showarrow: false,
		font: { color: theme.series[ink - 1], size: 13 }
	}));
}

export function realAxisFigure(
	series: readonly RealSeries[],
	panels: Panels,
	abscissa: Abscissa,
	theme: FigureTheme,
	size: FigureSize
): { data: Data[]; layout: Partial<Layout> } {
	const quantities = PANELS[panels];
	const scales = quantities.map((quantity) => panelScale(series, quantity));
	const plotHeight = size.height - MARGIN.t - MARGIN.b;
	const shown = shownRange(series);
	const ends = [abscissaOf(shown.low, abscissa), abscissaOf(shown.high, abscissa)].sort((a, b) => a - b);
	const powers = Array.from({ length: 16 }, (_, index) => index - 8).filter(
		(power) => 10 ** power >= ends[0] && 10 ** power <= ends[1]
	);

	const axis: Partial<LayoutAxis> = {
		showgrid: true,
		gridcolor: theme.rule,
		zeroline: false,
		linecolor: theme.edge,
		tickcolor: theme.edge,
		ticks: 'outside',
		ticklen: 5,
		tickfont: { color: theme.muted, size: 11.5 },
		fixedrange: false
	};
	const yAxis = (panel: number): Partial<LayoutAxis> => ({
		...axis,
		type: scales[panel].log ? 'log' : 'linear',
		range: [scales[panel].low, scales[panel].high],
		tickvals: scales[panel].tickvals,
		ticktext: scales[panel].ticktext,
		domain: panel === 0 ? [1 - PANEL_SHARE, 1] : [0, PANEL_SHARE],
		title: {
			text: `<i>${NAMES[quantities[panel]]}</i>`,
			font: { family: 'STIX Two Text Variable, serif', size: 16, color: theme.ink },
			standoff: 6
		}
	});

	return {
		data: quantities.flatMap((quantity, panel) =>
			tracesOf(series, quantity, panel, scales[panel], abscissa, theme)
		),
		layout: {
			width: size.width,
			height: size.height,
			margin: MARGIN,
			paper_bgcolor: 'transparent',
			plot_bgcolor: 'transparent',
			showlegend: false,
			hovermode: 'closest',
			hoverlabel: {
				bgcolor: theme.page,
				bordercolor: theme.ink,
				font: { family: 'Archivo Variable, sans-serif', size: 13, color: theme.ink }
			},
			font: { family: 'Archivo Variable, sans-serif', size: 12, color: theme.ink },
			xaxis: {
				...axis,
				type: 'log',
				anchor: 'y2',
				range: [Math.log10(ends[0]), Math.log10(ends[1])],
				tickvals: powers.map((power) => 10 ** power),
				ticktext: powers.map((power) =>
					abscissa === 'energy' ? quantityLine(10 ** power, ENERGY, 1) : `${numberLine(10 ** power, 1)} µm`
				),
				minor: {
					ticks: 'outside',
					ticklen: 3,
					tickcolor: theme.edge,
					tickvals: powers.flatMap((power) => [2, 3, 4, 5, 6, 7, 8, 9].map((step) => step * 10 ** power)),
					showgrid: false
				},
				title: {
					text: abscissa === 'energy' ? 'Photon energy <i>ħω</i>' : 'Wavelength in vacuum',
					font: { size: 13, color: theme.ink },
					standoff: 8
				}
			},
			yaxis: yAxis(0),
			yaxis2: yAxis(1),
			annotations: quantities.flatMap((quantity, panel) =>
				endLetters(series, quantity, panel, scales[panel], abscissa, theme, plotHeight)
			)
		}
	};
}
