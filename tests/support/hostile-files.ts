/**
 * Files as they come from instruments, spreadsheets and people in a hurry, and worse: made from a seed, each with what a slow and
 * literal reader makes of it. The reader shares no code with the application's.
 */

export interface HostileFile {
	what: string;
	bytes: Uint8Array<ArrayBuffer>;
	description: Record<string, unknown>;
	/** The rows that must come out, or null where the file has to be refused. */
	expected: { energiesEv: number[]; epsilon2: number[] } | null;
}

export function randomFrom(seed: number): () => number {
	let state = seed >>> 0;
	return () => {
		state = (state + 0x6d2b79f5) >>> 0;
		let t = state;
		t = Math.imul(t ^ (t >>> 15), t | 1);
		t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
		return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
	};
}

type Random = () => number;
const pick = <T>(random: Random, some: readonly T[]): T => some[Math.floor(random() * some.length)];

interface Row {
	/** As written in the file. */
	cells: string[];
}

interface Draft {
	rows: Row[];
	delimiter: string;
	decimal: string;
	lineEnd: string;
	header: string[];
}

/** c h / e in eV nm, from the exact SI values. */
const EV_NM = (299792458 * 6.62607015e-34 * 1e9) / 1.602176634e-19;

/** Everything but tabs and line ends that a number may be written with. */
function written(value: number, decimal: string, random: Random): string {
	const style = Math.floor(random() * 4);
	const text =
		style === 0
			? String(value)
			: style === 1
				? value.toExponential(8)
				: style === 2
					? value.toPrecision(9)
					: `+${value}`;
	return decimal === ',' ? text.replace('.', ',') : text;
}

/** A cell read letter by letter; null where it is no plain decimal number. */
export function literal(cell: string, decimal: string): number | null {
	const text = cell.trim();
	let at = 0;
	const digits = () => {
		const from = at;
		while (at < text.length && text[at] >= '0' && text[at] <= '9') at += 1;
		return at - from;
	};
	if (text[at] === '+' || text[at] === '-') at += 1;
	const whole = digits();
	let part = 0;
	if (text[at] === decimal) {
		at += 1;
		part = digits();
	}
	if (whole + part === 0) return null;
	if (text[at] === 'e' || text[at] === 'E') {
		at += 1;
		if (text[at] === '+' || text[at] === '-') at += 1;
		const power = digits();
		if (power === 0 || power > 4) return null;
	}
	if (at !== text.length) return null;
	const value = Number.parseFloat(text.replace(decimal, '.'));
	if (!Number.isFinite(value)) return null;
	const isZero = /^[+-]?[0.,]+([eE].*)?$/.test(text);
	return value === 0 && !isZero ? null : value;
}

function wellFormed(random: Random): Draft & { unit: 'nm' | 'eV' } {
	const unit = pick(random, ['nm', 'eV'] as const);
	const delimiter = pick(random, [';', '\t', ','] as const);
	const decimal = delimiter === ',' ? '.' : pick(random, ['.', ',']);
	const count = 3 + Math.floor(random() * 30);
	let at = unit === 'nm' ? 150 + random() * 100 : 0.5 + random();
	const rows = Array.from({ length: count }, () => {
		at *= 1.01 + random() * 0.2;
		const [n, k] = [0.1 + random() * 3, random() * 4];
		return { cells: [at, n, k].map((value) => written(Number(value.toPrecision(9)), decimal, random)) };
	});
	return {
		unit,
		delimiter,
		decimal,
		rows: random() < 0.3 ? rows.reverse() : rows,
		lineEnd: pick(random, ['\n', '\r\n', '\r']),
		header: random() < 0.5 ? [`${unit}`, 'n', 'k'] : []
	};
}

type Harm = [what: string, harm: (draft: Draft, random: Random) => void];

const someRow = (draft: Draft, random: Random) => draft.rows[Math.floor(random() * draft.rows.length)];
const someColumn = (random: Random) => Math.floor(random() * 3);

/** Each leaves a file that no honest reader takes. */
const HARMS: Harm[] = [
	['an empty cell', (draft, random) => void (someRow(draft, random).cells[someColumn(random)] = '')],
	[
		'a hexadecimal number',
		(draft, random) => void (someRow(draft, random).cells[someColumn(random)] = '0x1F')
	],
	['not a number', (draft, random) => void (someRow(draft, random).cells[someColumn(random)] = 'NaN')],
	['an infinity', (draft, random) => void (someRow(draft, random).cells[1] = 'Infinity')],
	['a typographic minus', (draft, random) => void (someRow(draft, random).cells[2] = '\u22121')],
	['digits of another script', (draft, random) => void (someRow(draft, random).cells[1] = '\u0661\u0662')],
	['an exponent of Fortran', (draft, random) => void (someRow(draft, random).cells[1] = '1D0')],
	['a number beyond range', (draft, random) => void (someRow(draft, random).cells[1] = '1e999')],
	['a number that falls to zero', (draft, random) => void (someRow(draft, random).cells[1] = '1e-400')],
	['a spreadsheet formula', (draft, random) => void (someRow(draft, random).cells[1] = '=1+1')],
	['markup', (draft, random) => void (someRow(draft, random).cells[1] = '<img src=x onerror=alert(1)>')],
	['a quotation', (draft, random) => void (someRow(draft, random).cells[1] = `'; drop table version; --`)],
	['gain', (draft, random) => void (someRow(draft, random).cells[2] = '-1')],
	['a negative abscissa', (draft, random) => void (someRow(draft, random).cells[0] = '-100')],
	['an abscissa of zero', (draft, random) => void (someRow(draft, random).cells[0] = '0')],
	['a row too short', (draft, random) => void someRow(draft, random).cells.pop()],
	['a row too long', (draft, random) => void someRow(draft, random).cells.push('1')],
	[
		'a row that stands twice',
		(draft, random) => {
			const at = Math.floor(random() * draft.rows.length);
			draft.rows.splice(at, 0, { cells: [...draft.rows[at].cells] });
		}
	],
	[
		'rows out of order',
		(draft) => {
			const [first, second] = draft.rows;
			draft.rows[0] = second;
			draft.rows[1] = first;
		}
	],
	['one row only', (draft) => void draft.rows.splice(1)]
];

const BINARIES: [what: string, start: number[]][] = [
	['gzip', [0x1f, 0x8b, 8, 0]],
	['zip', [0x50, 0x4b, 3, 4]],
	['PDF', [0x25, 0x50, 0x44, 0x46]],
	['PNG', [0x89, 0x50, 0x4e, 0x47]],
	['JPEG', [0xff, 0xd8, 0xff]],
	['an old spreadsheet', [0xd0, 0xcf, 0x11, 0xe0]],
	['a NUL inside', [0x31, 0x3b, 0x00]]
];

function encoded(text: string, random: Random): { bytes: Uint8Array<ArrayBuffer>; what: string } {
	switch (Math.floor(random() * 4)) {
		case 0: {
			const bytes = new Uint8Array(text.length + 3);
			bytes.set([0xef, 0xbb, 0xbf]);
			for (let at = 0; at < text.length; at += 1) bytes[at + 3] = text.charCodeAt(at);
			return isAscii(text) ? { bytes, what: 'UTF-8 with a mark' } : plain(text);
		}
		case 1: {
			const bytes = new Uint8Array(2 * text.length + 2);
			const view = new DataView(bytes.buffer);
			view.setUint16(0, 0xfeff, true);
			for (let at = 0; at < text.length; at += 1) view.setUint16(2 * at + 2, text.charCodeAt(at), true);
			return { bytes, what: 'UTF-16' };
		}
		default:
			return plain(text);
	}
}

const isAscii = (text: string) => [...text].every((character) => character.charCodeAt(0) < 128);
const plain = (text: string) => ({ bytes: new TextEncoder().encode(text), what: 'UTF-8' });

/** The file number `index` of a seed. */
export function hostileFile(seed: number, index: number): HostileFile {
	const random = randomFrom(seed * 1_000_003 + index);
	if (random() < 0.08) {
		const [what, start] = pick(random, BINARIES);
		const rest = Array.from({ length: 40 }, () => Math.floor(random() * 256));
		return {
			what: `${what} under the name of a table`,
			bytes: Uint8Array.from([...start, ...rest]),
			description: describe('nm', ';', '.'),
			expected: null
		};
	}
	const draft = wellFormed(random);
	const harmed = random() < 0.6 ? pick(random, HARMS) : null;
	harmed?.[1](draft, random);
	const comments = random() < 0.3 ? ['# measured; 1,2 or 3', '% a remark'] : [];
	const lines = [
		...comments,
		...(draft.header.length > 0 ? [draft.header.join(draft.delimiter)] : []),
		...draft.rows.map(({ cells }) => cells.join(draft.delimiter)),
		''
	];
	const text = lines.join(draft.lineEnd);
	const { bytes, what } = encoded(text, random);
	return {
		what: `${harmed ? harmed[0] : 'nothing wrong'}, ${what}, "${draft.delimiter}" and "${draft.decimal}"`,
		bytes,
		description: describe(draft.unit, draft.delimiter, draft.decimal),
		expected: harmed && !isHarmless(draft) ? null : rowsOf(draft, draft.unit)
	};
}

/** A harm may by chance leave what it found, as a zero where one stood. */
function isHarmless(draft: Draft): boolean {
	if (draft.rows.length < 2 || draft.rows.some(({ cells }) => cells.length !== 3)) return false;
	const read = draft.rows.map(({ cells }) => cells.map((cell) => literal(cell, draft.decimal)));
	if (read.some((row) => row.some((value) => value === null))) return false;
	const rows = read as number[][];
	if (rows.some(([at, n, k]) => !(at > 0) || n < 0 || k < 0)) return false;
	const way = Math.sign(rows[rows.length - 1][0] - rows[0][0]);
	return way !== 0 && rows.every(([at], index) => index === 0 || (at - rows[index - 1][0]) * way > 0);
}

function rowsOf(draft: Draft, unit: 'nm' | 'eV'): { energiesEv: number[]; epsilon2: number[] } {
	const rows = draft.rows
		.map(({ cells }) => cells.map((cell) => literal(cell, draft.decimal) ?? Number.NaN))
		.map(([at, n, k]) => ({ energy: unit === 'eV' ? at : EV_NM / at, epsilon2: 2 * n * k }))
		.sort((a, b) => a.energy - b.energy);
	return { energiesEv: rows.map(({ energy }) => energy), epsilon2: rows.map(({ epsilon2 }) => epsilon2) };
}

const describe = (unit: string, delimiter: string, decimal: string) => ({
	delimiter,
	decimal,
	abscissa: { column: 1, unit },
	ordinates: [
		{ column: 2, quantity: 'n' },
		{ column: 3, quantity: 'k' }
	],
	source: 'johnson-christy-1972'
});
