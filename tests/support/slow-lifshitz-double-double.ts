/**
 * Numbers of about 32 digits as an unevaluated sum of two doubles (Dekker 1971), enough to subtract two permittivities
 * that agree in six digits and keep the difference to the last bit of a double.
 */
export type DoubleDouble = readonly [high: number, low: number];

/** 2^27 + 1, splits a double in two halves of 26 bits. */
const SPLITTER = 134217729;

function twoSum(a: number, b: number): DoubleDouble {
	const sum = a + b;
	const part = sum - a;
	return [sum, a - (sum - part) + (b - part)];
}

function quickTwoSum(a: number, b: number): DoubleDouble {
	const sum = a + b;
	return [sum, b - (sum - a)];
}

/** Valid while neither factor exceeds 1e300; frequencies here stay below 1e21 rad/s. */
function twoProduct(a: number, b: number): DoubleDouble {
	const product = a * b;
	const aScaled = SPLITTER * a;
	const aHigh = aScaled - (aScaled - a);
	const aLow = a - aHigh;
	const bScaled = SPLITTER * b;
	const bHigh = bScaled - (bScaled - b);
	const bLow = b - bHigh;
	return [product, aHigh * bHigh - product + aHigh * bLow + aLow * bHigh + aLow * bLow];
}

export function toDoubleDouble(a: number): DoubleDouble {
	return [a, 0];
}

export function add(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
	const [high, low] = twoSum(a[0], b[0]);
	const [tailHigh, tailLow] = twoSum(a[1], b[1]);
	const [middle, rest] = quickTwoSum(high, low + tailHigh);
	return quickTwoSum(middle, rest + tailLow);
}

export function negate(a: DoubleDouble): DoubleDouble {
	return [-a[0], -a[1]];
}

export function multiply(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
	const [high, low] = twoProduct(a[0], b[0]);
	return quickTwoSum(high, low + a[0] * b[1] + a[1] * b[0]);
}

export function divide(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
	const first = a[0] / b[0];
	const afterFirst = add(a, negate(multiply(b, [first, 0])));
	const second = afterFirst[0] / b[0];
	const afterSecond = add(afterFirst, negate(multiply(b, [second, 0])));
	const third = afterSecond[0] / b[0];
	return add(quickTwoSum(first, second), [third, 0]);
}

export function toNumber(a: DoubleDouble): number {
	return a[0] + a[1];
}
