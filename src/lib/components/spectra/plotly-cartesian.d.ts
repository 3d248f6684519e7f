/** The small bundle carries no types of its own; it is a part of the full one, which does. */
declare module 'plotly.js-cartesian-dist-min' {
	export * from 'plotly.js-dist-min';
	export { default } from 'plotly.js-dist-min';
}
