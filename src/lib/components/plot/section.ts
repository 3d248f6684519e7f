import type { MaterialClass } from '../ui/hatch.ts';
import type { LogScale } from '../../study-sheet/log-scale.ts';

/** Places of the parts of a cross-section, in pixels. */

export interface SectionMaterial {
	name: string;
	materialClass: MaterialClass;
}

export interface SectionLayer extends SectionMaterial {
	thicknessNm: number;
	/** Name with thickness. */
	label: string;
}

export interface SectionBody {
	/** From the gap outwards. */
	layers: readonly SectionLayer[];
	substrate: SectionMaterial;
}

export interface SectionPart {
	x: number;
	width: number;
	materialClass: MaterialClass;
}

/** A layer on the left is at least this wide and grows with the logarithm of its thickness. */
const LAYER_MIN = 5;
const LAYER_PER_DECADE = 4;
const BREAK = 4;

function leftLayerWidth(thicknessNm: number, room: number, count: number): number {
	const wanted = LAYER_MIN + LAYER_PER_DECADE * Math.max(0, Math.log10(thicknessNm / 0.1));
	return Math.min(wanted, room / (count + 1));
}

export const sectionParts = {
	/** The left body lies before the axis: its layers, surface first, then what is left of the margin. */
	left(body: SectionBody, origin: number): SectionPart[] {
		const room = origin - BREAK - 2;
		let edge = origin;
		const parts = body.layers.map(({ thicknessNm, materialClass }) => {
			const width = leftLayerWidth(thicknessNm, room, body.layers.length);
			edge -= width;
			return { x: edge, width, materialClass };
		});
		return [...parts, { x: BREAK + 2, width: edge - BREAK - 2, materialClass: body.substrate.materialClass }];
	},

	/** The right body stands on the axis itself: a layer reaches from d to d + t, true to the scale. */
	right(body: SectionBody, x: LogScale, atNm: number, end: number): SectionPart[] {
		let depth = atNm;
		const parts = body.layers.map(({ thicknessNm, materialClass }) => {
			const from = Math.min(end, x.at(depth));
			depth += thicknessNm;
			return { x: from, width: Math.min(end, x.at(depth)) - from, materialClass };
		});
		const from = Math.min(end, x.at(depth));
		return [...parts, { x: from, width: end - from, materialClass: body.substrate.materialClass }];
	},

	/** The wavy edge by which a drawing says "goes on". */
	breakLine(at: number, height: number): string {
		const sixth = height / 6;
		return `M${at} 0l-${BREAK} ${sixth} ${2 * BREAK} ${sixth} -${2 * BREAK} ${sixth} ${2 * BREAK} ${sixth} -${2 * BREAK} ${sixth} ${BREAK} ${sixth}`;
	}
};
