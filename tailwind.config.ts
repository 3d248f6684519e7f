import type { Config } from 'tailwindcss';

/**
 * The design tokens. Colours are variables so that light, dark and print are three designs, not one inverted;
 * app.css gives them their values. The framework's palette, radii and shadows are switched off.
 */
const token = (name: string) => `var(--${name})`;

export default {
	darkMode: 'media',
	theme: {
		colors: {
			transparent: 'transparent',
			current: 'currentColor',
			page: token('page'),
			panel: token('panel'),
			ink: token('ink'),
			muted: token('muted'),
			faint: token('faint'),
			edge: token('edge'),
			rule: token('rule'),
			hairline: token('hairline'),
			action: token('action'),
			good: token('good'),
			caution: token('caution'),
			series: {
				1: token('series-1'),
				2: token('series-2'),
				3: token('series-3'),
				4: token('series-4'),
				5: token('series-5')
			}
		},
		borderRadius: { none: '0', DEFAULT: '2px' },
		boxShadow: {},
		dropShadow: {},
		fontFamily: {
			sans: ['"Archivo Variable"', 'sans-serif'],
			symbol: ['"STIX Two Text Variable"', 'serif'],
			mono: ['"Commit Mono"', 'monospace']
		},
		fontSize: {
			small: ['13px', '1.35'],
			base: ['15px', '1.45'],
			lead: ['18px', '1.4'],
			title: ['25px', '1.15'],
			display: ['36px', '1.1']
		},
		spacing: Object.fromEntries(
			[0, 1, 2, 3, 4, 5, 6, 7, 8, 10, 12, 14, 16, 20, 24].map((n) => [n, `${n * 4}px`])
		),
		screens: { phone: { max: '600px' }, narrow: { max: '1100px' }, wide: '1101px' }
	}
} satisfies Config;
