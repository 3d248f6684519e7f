import type { FigureTheme } from './real-axis-figure.ts';

/** The tokens as they stand now: light, dark or print. The plotting package needs their values, not their names. */
export function figureTheme(element: Element): FigureTheme {
	const style = getComputedStyle(element);
	const token = (name: string) => style.getPropertyValue(`--${name}`).trim();
	return {
		ink: token('ink'),
		muted: token('muted'),
		edge: token('edge'),
		rule: token('rule'),
		page: token('page'),
		series: [1, 2, 3, 4, 5].map((ink) => token(`series-${ink}`))
	};
}
