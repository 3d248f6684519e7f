import { ENERGY, quantityLine } from '../../format/quantity.ts';
import type { EnergyRangeEv } from '../../schemas/version.ts';
import { logScale } from '../../study-sheet/log-scale.ts';

/** The one axis that every range bar of the library shares: photon energy, 1 meV to 10 keV, in per cent of its width. */

export const AXIS_EV = { min: 1e-3, max: 1e4 } as const;

const scale = logScale([AXIS_EV.min, AXIS_EV.max], [0, 100]);

export interface AxisMark {
	energyEv: number;
	percent: number;
	/** Empty for the marks between two decades. */
	label: string;
	/** Every other label, left out where the axis is too short for all. */
	spare: boolean;
	/** The first and the last label stay inside the axis. */
	anchor: 'start' | 'middle' | 'end';
}

export function percentOfEnergy(energyEv: number): number {
	return scale.at(Math.min(AXIS_EV.max, Math.max(AXIS_EV.min, energyEv)));
}

export function energyAtPercent(percent: number): number {
	return scale.invert(percent);
}

function anchorOf(energyEv: number): AxisMark['anchor'] {
	if (energyEv === AXIS_EV.min) return 'start';
	return energyEv === AXIS_EV.max ? 'end' : 'middle';
}

export const AXIS_MARKS: readonly AxisMark[] = [
	...scale.decades.map((energyEv) => ({
		energyEv,
		percent: scale.at(energyEv),
		label: quantityLine(energyEv, ENERGY, 1),
		spare: Math.round(Math.log10(energyEv)) % 2 !== 0,
		anchor: anchorOf(energyEv)
	})),
	...scale.minors.map((energyEv) => ({
		energyEv,
		percent: scale.at(energyEv),
		label: '',
		spare: false,
		anchor: 'middle' as const
	}))
];

export interface BarPart {
	kind: 'measured' | 'extrapolated';
	/** Left end and width in per cent of the axis. */
	left: number;
	width: number;
}

/**
 * The parts of one bar: the measured or fitted span, and what the model adds on both sides of it.
 * A span that lies outside the axis altogether leaves no part.
 */
export function barParts(measured: EnergyRangeEv | null, extrapolated: EnergyRangeEv | null): BarPart[] {
	const parts: BarPart[] = [];
	const add = (kind: BarPart['kind'], from: number, to: number) => {
		const left = percentOfEnergy(from);
		const width = percentOfEnergy(to) - left;
		if (width > 0) parts.push({ kind, left, width });
	};
	if (measured === null) {
		if (extrapolated !== null) add('extrapolated', extrapolated.low, extrapolated.high);
		return parts;
	}
	if (extrapolated !== null) add('extrapolated', extrapolated.low, Math.min(extrapolated.high, measured.low));
	add('measured', measured.low, measured.high);
	if (extrapolated !== null)
		add('extrapolated', Math.max(extrapolated.low, measured.high), extrapolated.high);
	return parts;
}

export function covers(range: EnergyRangeEv | null, energyEv: number): boolean {
	return range !== null && energyEv >= range.low && energyEv <= range.high;
}
