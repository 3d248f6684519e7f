import type { Study } from './study.ts';

/** The arrangement of a first visit: published data sets of one liquid disagree about the sign of the force. */
export const WORKED_STUDY: Study = {
	left: { layers: [], substrate: { version: 'gold-lorentz-drude@1.0' } },
	medium: { version: 'bromobenzene-debye-uv@1.0' },
	right: { layers: [], substrate: { version: 'silica-two-oscillators@1.0' } },
	shape: { kind: 'plates' },
	temperatureK: 300,
	choices: [
		{ name: 'Debye and one UV term', changes: {} },
		{ name: 'Seven oscillators', changes: { medium: { version: 'bromobenzene-seven-oscillators@1.0' } } }
	],
	fromNm: 1,
	toNm: 10_000,
	quantity: 'pressure',
	atNm: 38,
	marks: [],
	against: 'ideal'
};
