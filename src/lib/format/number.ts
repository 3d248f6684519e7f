/** Numbers as people read them: typographic minus, thin spaces, powers of ten as markup and not as Unicode digits. */

export const MINUS = '\u2212';
const THIN_SPACE = '\u202f';

/** A number split so that a page can set the exponent as a superscript. */
export interface NumberText {
	/** Digits with sign, as "−2.43". */
	mantissa: string;
	/** Power of ten, or null where none is needed. */
	exponent: number | null;
}

function grouped(text: string): string {
	const [whole, fraction] = text.split('.');
	const spaced = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE) : whole;
	return fraction === undefined ? spaced : `${spaced}.${fraction}`;
}

/** `digits` significant figures; plain between 0.001 and 99 999, else with a power of ten. */
export function numberText(value: number, digits = 3): NumberText {
	if (value === 0) return { mantissa: '0', exponent: null };
	const sign = value < 0 ? MINUS : '';
	const rounded = Math.abs(value).toExponential(digits - 1);
	const exponent = Number(rounded.slice(rounded.indexOf('e') + 1));
	if (exponent < -3 || exponent > 4) {
		return { mantissa: sign + rounded.slice(0, rounded.indexOf('e')), exponent };
	}
	const plain = Number(rounded).toFixed(Math.max(0, digits - 1 - exponent));
	return { mantissa: sign + grouped(plain), exponent: null };
}

/** One line of text, for attributes and speech: "−2.43 × 10^−9". */
export function numberLine(value: number, digits = 3): string {
	const { mantissa, exponent } = numberText(value, digits);
	return exponent === null ? mantissa : `${mantissa} × 10^${exponent < 0 ? MINUS : ''}${Math.abs(exponent)}`;
}

/** Per cent with sign where asked: "+12 %", "0.4 %". */
export function percent(share: number, { signed = false, digits = 2 } = {}): string {
	const text = numberText(share * 100, digits).mantissa;
	return `${signed && share > 0 ? '+' : ''}${text} %`;
}

/** A change given in per cent, with its sign: "+12.3 %". */
export function signedPercent(change: number, digits = 3): string {
	return `${change > 0 ? '+' : ''}${numberLine(change, digits)} %`;
}
