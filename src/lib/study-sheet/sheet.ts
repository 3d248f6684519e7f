import { MINUS, percent } from '../format/number.ts';
import { comparisonLimits, comparisonTicks } from './comparison.ts';
import { linePath, magnitudeAxis, magnitudePaths, spreadLabels } from './curve-data.ts';
import { logScale, type LogScale } from './log-scale.ts';
import { dashOf, type DrawnChoice } from './strip.ts';

/**
 * The stack as one picture to take away: SVG whose text stays text, without any reference to the outside, with the title
 * block inside. 672 px are 178 mm, the width of a journal page.
 */

export interface Sheet {
	/** Empty where whoever places the picture sets the title above it. */
	title: string;
	magnitudeLabel: string;
	legend: string;
	comparisonLabel: string;
	/** Ratios are written as they are, differences in per cent. */
	comparisonInPercent: boolean;
	/** Decades of the axis with their labels. */
	decadeLabel: (separationNm: number) => string;
	fromNm: number;
	toNm: number;
	atNm: number;
	unitSize: number;
	choices: readonly DrawnChoice[];
	/** What stands on the bars, by sign. */
	words: Record<'-1' | '0' | '1', string>;
	/** Lines of the title block; none where it is set beside the picture. */
	block: readonly string[];
	/** Colour of each token, as the page has it in light. */
	colour: (token: string) => string;
}

const WIDTH = 672;
const LEFT = 74;
const RIGHT = 60;
const LINE = 15;

const escape = (text: string) =>
	text.replace(
		/[&<>"]/g,
		(sign) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' })[sign] ?? sign
	);

type Attributes = Record<string, string | number | undefined>;

function tag(name: string, attributes: Attributes, content = ''): string {
	const written = Object.entries(attributes)
		.filter(([, value]) => value !== undefined && value !== '')
		.map(([key, value]) => ` ${key}="${escape(String(value))}"`)
		.join('');
	return `<${name}${written}>${content}</${name}>`;
}

function text(x: number, y: number, content: string, more: Attributes = {}): string {
	return tag('text', { x, y, ...more }, escape(content));
}

function power(x: number, y: number, exponent: number, fill: string): string {
	const raised = tag(
		'tspan',
		{ dy: -5, 'font-size': 9 },
		`${exponent < 0 ? MINUS : ''}${Math.abs(exponent)}`
	);
	return tag('text', { x, y, 'text-anchor': 'end', fill }, `10${raised}`);
}

/** @param unitSize  of the axis; the ratio has none and is drawn in ones */
function magnitudeStrip(
	{ colour }: Sheet,
	choices: readonly Pick<DrawnChoice, 'letter' | 'ink' | 'series'>[],
	unitSize: number,
	x: LogScale,
	top: number,
	height: number
): string {
	const scaled = choices.map((choice) => ({
		...choice,
		series: { ...choice.series, values: choice.series.values.map((value) => value / unitSize) }
	}));
	const y = magnitudeAxis(
		scaled.map(({ series }) => series),
		top,
		height
	);
	const [start, end] = [x.at(x.min), x.at(x.max)];
	const rules = y.ticks.map((tick) =>
		tag('path', { d: `M${start} ${y.at(10 ** tick)}H${end}`, stroke: colour('rule') })
	);
	const labels = y.labels.map((tick) => power(start - 8, y.at(10 ** tick) + 4, tick, colour('muted')));
	const lines = scaled.map(({ ink, series }) => {
		const { attracts, repels } = magnitudePaths(series, x, y);
		const stroke = colour(`series-${ink}`);
		return [
			tag('path', { d: attracts, stroke, 'stroke-width': 2.4, 'stroke-dasharray': dashOf(ink) }),
			tag('path', { d: repels, stroke, 'stroke-width': 4.6, 'stroke-dasharray': dashOf(ink) }),
			tag('path', { d: repels, stroke: colour('page'), 'stroke-width': 2.2 })
		].join('');
	});
	const drawn = scaled.filter(({ series }) => series.values.some((value) => value !== 0));
	const places = spreadLabels(
		drawn.map(({ series }) => y.at(Math.abs(series.values[series.values.length - 1]))),
		14,
		top,
		top + height
	);
	const ends = drawn.map(({ letter, ink }, index) =>
		text(end + 8, places[index] + 4, letter, { fill: colour(`series-${ink}`), 'font-weight': 640 })
	);
	return tag('g', { fill: 'none' }, [...rules, ...lines].join('')) + [...labels, ...ends].join('');
}

function signBars(sheet: Sheet, x: LogScale, top: number): string {
	return sheet.choices
		.flatMap(({ letter, ink, runs }, row) => {
			const y = top + row * 20;
			const stroke = sheet.colour(`series-${ink}`);
			const bars = runs.flatMap(({ fromNm, toNm, sign }) => {
				const from = x.at(fromNm);
				const width = Math.max(0, x.at(toNm) - from - 1.5);
				const bar = tag('rect', {
					...{ x: from + 0.75, y, width, height: 13, stroke, 'stroke-width': 1.5 },
					fill: sign < 0 ? stroke : 'none'
				});
				if (width < 56) return [bar];
				const fill = sheet.colour(sign < 0 ? 'page' : 'ink');
				const word = sheet.words[`${sign}`];
				return [
					bar,
					text(from + width / 2, y + 10.5, word, { 'text-anchor': 'middle', 'font-size': 11, fill })
				];
			});
			return [
				text(LEFT - 8, y + 11, letter, { 'text-anchor': 'end', 'font-weight': 640, fill: stroke }),
				...bars
			];
		})
		.join('');
}

function comparisonStrip(sheet: Sheet, x: LogScale, top: number, height: number): string {
	const { colour, choices } = sheet;
	if (!sheet.comparisonInPercent) {
		const ratios = choices.map(({ letter, ink, ratio }) => ({ letter, ink, series: ratio }));
		return magnitudeStrip(sheet, ratios, 1, x, top, height);
	}
	const compared = choices.flatMap(({ difference, ink }) => (difference ? [{ ...difference, ink }] : []));
	const limits = comparisonLimits(compared, 0.02);
	const y = (value: number) => top + height - ((value - limits[0]) / (limits[1] - limits[0])) * height;
	const ticks = comparisonTicks(limits).map(
		(tick) =>
			tag('path', {
				d: `M${x.at(x.min)} ${y(tick)}H${x.at(x.max)}`,
				stroke: colour(tick === 0 ? 'edge' : 'rule')
			}) +
			text(LEFT - 8, y(tick) + 4, percent(tick, { signed: true, digits: 3 }), {
				'text-anchor': 'end',
				fill: colour('muted')
			})
	);
	const lines = compared.map(({ separationsNm, values, ink }) =>
		tag('path', {
			d: linePath(separationsNm, values, x, y, limits),
			fill: 'none',
			stroke: colour(`series-${ink}`),
			'stroke-width': 2,
			'stroke-dasharray': dashOf(ink)
		})
	);
	return [...ticks, ...lines].join('');
}

function axis(sheet: Sheet, x: LogScale, top: number): string {
	const ink = sheet.colour('ink');
	const ticks = [...x.decades.map((value) => [value, 9]), ...x.minors.map((value) => [value, 4])];
	const d = [
		`M${x.at(x.min)} ${top}H${x.at(x.max)}`,
		...ticks.map(([value, size]) => `M${x.at(value).toFixed(1)} ${top}v${size}`)
	];
	const labels = x.decades.map((value) =>
		text(x.at(value), top + 22, sheet.decadeLabel(value), {
			'text-anchor': 'middle',
			fill: sheet.colour('muted')
		})
	);
	return tag('path', { d: d.join(''), stroke: ink, fill: 'none' }) + labels.join('');
}

/** Characters of a line of the block, at the size it is set in. */
const LINE_CHARACTERS = 106;

/** Long lines broken at a blank, or inside an address, which has none. */
export function brokenLines(lines: readonly string[], most = LINE_CHARACTERS): string[] {
	return lines.flatMap((line) => {
		const pieces: string[] = [];
		let rest = line;
		while (rest.length > most) {
			const blank = rest.lastIndexOf(' ', most);
			const at = blank > most / 2 ? blank + 1 : most;
			pieces.push(rest.slice(0, at).trimEnd());
			rest = rest.slice(at);
		}
		return [...pieces, rest];
	});
}

export function sheetSvg(given: Sheet): string {
	const sheet = { ...given, block: brokenLines(given.block) };
	const { colour } = sheet;
	const x = logScale([sheet.fromNm, sheet.toNm], [LEFT, WIDTH - RIGHT]);
	const heading = { fill: colour('ink'), 'font-weight': 640 };
	const signTop = 310;
	const comparisonTop = signTop + 20 * sheet.choices.length + 34;
	const axisTop = comparisonTop + 82;
	const blockTop = axisTop + 44;
	const height = sheet.block.length > 0 ? blockTop + LINE * sheet.block.length + 24 : axisTop + 30;
	const at = x.at(sheet.atNm);

	const body = [
		tag('title', {}, escape(sheet.title)),
		tag('desc', {}, escape(sheet.block.join('\n'))),
		tag('rect', { width: WIDTH, height, fill: colour('page') }),
		text(LEFT, 26, sheet.title, { ...heading, 'font-size': 18 }),
		text(LEFT, 50, sheet.magnitudeLabel, heading),
		text(WIDTH - RIGHT, 50, sheet.legend, { 'text-anchor': 'end', fill: colour('muted') }),
		magnitudeStrip(sheet, sheet.choices, sheet.unitSize, x, 60, 224),
		text(LEFT, signTop - 8, 'Sign', heading),
		signBars(sheet, x, signTop),
		text(LEFT, comparisonTop - 10, sheet.comparisonLabel, heading),
		comparisonStrip(sheet, x, comparisonTop, 70),
		axis(sheet, x, axisTop),
		tag('path', { d: `M${at} 56V${axisTop}`, stroke: colour('hairline'), 'stroke-width': 1.25 }),
		sheet.block.length === 0
			? ''
			: tag('rect', {
					...{ x: 8.5, y: blockTop, width: WIDTH - 17, height: LINE * sheet.block.length + 14 },
					...{ fill: 'none', stroke: colour('ink') }
				}),
		...sheet.block.map((line, index) => text(17, blockTop + 18 + LINE * index, line, { fill: colour('ink') }))
	];
	return tag(
		'svg',
		{
			xmlns: 'http://www.w3.org/2000/svg',
			width: WIDTH,
			height,
			viewBox: `0 0 ${WIDTH} ${height}`,
			'font-family': 'Archivo Variable, Archivo, Arial, sans-serif',
			'font-size': 12
		},
		body.join('\n')
	);
}
