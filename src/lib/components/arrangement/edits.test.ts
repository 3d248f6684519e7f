import { describe, expect, it } from 'vitest';
import { study as studySchema, type Study } from '../../schemas/study.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import * as edits from './edits.ts';

const layer = (version: string, thicknessNm: number) => ({ of: { version }, thicknessNm });

/** Two layers on the left, and a choice that changes the outer one. */
function layered(): Study {
	const study = structuredClone(WORKED_STUDY);
	study.left.layers = [layer('inner@1.0', 5), layer('outer@1.0', 50)];
	study.choices[1].changes = { left2: { version: 'outer-b@1.0' }, left: { zeroFrequency: 'plasma' } };
	return study;
}

const names = (study: Study) => study.left.layers.map(({ of }) => of.version);

describe('axis and sheet', () => {
	const dressed = () => {
		const study = layered();
		study.left.substrate = { version: 'calcite-ordinary@1.0', zeroFrequency: 'dcCounted' };
		return study;
	};

	it('stand beside the rule of a place, and go without it', () => {
		const study = dressed();
		const axis = edits.setNormal('left', study.left.substrate, 'calcite-extraordinary@1.0')(study);
		const both = edits.setSheet('left', axis.left.substrate, 6e-5)(axis);
		expect(both.left.substrate).toEqual({
			version: 'calcite-ordinary@1.0',
			normal: 'calcite-extraordinary@1.0',
			sheetSiemens: 6e-5,
			zeroFrequency: 'dcCounted'
		});
		const ruleless = edits.setRule('left', both.left.substrate, undefined)(both);
		expect(ruleless.left.substrate.sheetSiemens).toBe(6e-5);
		const bare = edits.setSheet('left', ruleless.left.substrate, undefined)(ruleless);
		expect(edits.setNormal('left', bare.left.substrate, undefined)(bare).left.substrate).toEqual({
			version: 'calcite-ordinary@1.0'
		});
	});

	it('go with the material that they were of', () => {
		const study = dressed();
		const covered = edits.setSheet('left', study.left.substrate, 6e-5)(study);
		expect(edits.setMaterial('left', 'gold-drude@1.0')(covered).left.substrate).toEqual({
			version: 'gold-drude@1.0'
		});
	});
});

describe('layers', () => {
	it('are added at the surface, and a choice follows the layer it speaks of', () => {
		const study = edits.addLayer('left', layer('new@1.0', 2))(layered());
		expect(names(study)).toEqual(['new@1.0', 'inner@1.0', 'outer@1.0']);
		expect(study.choices[1].changes).toEqual({
			left3: { version: 'outer-b@1.0' },
			left: { zeroFrequency: 'plasma' }
		});
	});

	it('take the change of a choice with them when removed', () => {
		const study = edits.removeLayer('left', 1)(layered());
		expect(names(study)).toEqual(['inner@1.0']);
		expect(study.choices[1].changes).toEqual({ left: { zeroFrequency: 'plasma' } });
	});

	it('keep the change of a choice when another is removed', () => {
		expect(edits.removeLayer('left', 0)(layered()).choices[1].changes.left1).toEqual({
			version: 'outer-b@1.0'
		});
	});

	it('move, and stay where there is no further place', () => {
		const study = edits.moveLayer('left', 1, 0)(layered());
		expect(names(study)).toEqual(['outer@1.0', 'inner@1.0']);
		expect(study.choices[1].changes.left1).toEqual({ version: 'outer-b@1.0' });
		const before = layered();
		expect(edits.moveLayer('left', 0, -1)(before)).toBe(before);
	});

	it('get another thickness', () => {
		expect(edits.setThickness('left', 0, 7)(layered()).left.layers[0].thicknessNm).toBe(7);
	});
});

describe('materials', () => {
	it('replaced at a place drop rule and changes that spoke of the old one', () => {
		const study = edits.setMaterial('left', 'silver-drude@1.0')(layered());
		expect(study.left.substrate).toEqual({ version: 'silver-drude@1.0' });
		expect(study.choices[1].changes).toEqual({ left2: { version: 'outer-b@1.0' } });
	});

	it('are replaced in a layer and in the medium', () => {
		expect(edits.setMaterial('left2', 'x@1.0')(layered()).left.layers[1].of.version).toBe('x@1.0');
		expect(edits.setMaterial('medium', 'x@1.0')(layered()).medium.version).toBe('x@1.0');
	});

	it('take a rule and give it back', () => {
		const ruled = edits.setRule('left', WORKED_STUDY.left.substrate, 'plasma')(WORKED_STUDY);
		expect(ruled.left.substrate.zeroFrequency).toBe('plasma');
		expect(edits.setRule('left', ruled.left.substrate, undefined)(ruled)).toEqual(WORKED_STUDY);
	});

	it('keep their rule under another version', () => {
		const material = { version: 'gold-drude@1.0', zeroFrequency: 'plasma' } as const;
		const study = edits.setVersion('left', material, 'gold-drude@1.1')(layered());
		expect(study.left.substrate).toEqual({ version: 'gold-drude@1.1', zeroFrequency: 'plasma' });
		expect(study.choices).toEqual(layered().choices);
	});
});

describe('the whole arrangement', () => {
	it('swapped twice is itself, choices too', () => {
		const swapped = edits.swapBodies()(layered());
		expect(swapped.choices[1].changes).toEqual({
			right2: { version: 'outer-b@1.0' },
			right: { zeroFrequency: 'plasma' }
		});
		expect(edits.swapBodies()(swapped)).toEqual(layered());
	});

	it('has no force between plates', () => {
		const sphere = edits.setConditions({ shape: { kind: 'spherePlate', radiusUm: 5 }, quantity: 'force' })(
			layered()
		);
		expect(sphere.quantity).toBe('force');
		expect(edits.setConditions({ shape: { kind: 'plates' } })(sphere).quantity).toBe('pressure');
	});

	it('keeps the hairlines inside a new range', () => {
		const study = edits.setConditions({ fromNm: 100, toNm: 1000 })({ ...layered(), parkedNm: 5000 });
		expect([study.atNm, study.parkedNm]).toEqual([100, 1000]);
	});

	it('stays a valid study when ions are taken out', () => {
		const study = edits.setConditions({ debyeLengthNm: undefined })({ ...layered(), debyeLengthNm: 10 });
		expect(studySchema.parse(study)).not.toHaveProperty('debyeLengthNm');
	});
});

describe('model choices', () => {
	it('grow to five and no further, each beginning as the last', () => {
		let study = layered();
		for (let round = 0; round < 6; round++) study = edits.addChoice()(study);
		expect(study.choices).toHaveLength(5);
		expect(study.choices[4].changes).toEqual(study.choices[1].changes);
	});

	it('are removed but for the last one, and the comparison follows', () => {
		const against = { ...layered(), against: 1 };
		expect(edits.removeChoice(0)(against).against).toBe(0);
		expect(edits.removeChoice(1)(against).against).toBe('ideal');
		const one = edits.removeChoice(0)(layered());
		expect(edits.removeChoice(0)(one)).toBe(one);
	});

	it('change a place and take the change back', () => {
		const changed = edits.setChange(0, 'medium', { version: 'water@1.0' })(layered());
		expect(changed.choices[0].changes).toEqual({ medium: { version: 'water@1.0' } });
		expect(edits.setChange(0, 'medium', {})(changed)).toEqual(layered());
	});

	it('take in a newer version beside the present one, at every place that has it', () => {
		const study = edits.addSuccessor('silica-two-oscillators@1.0', 'silica-two-oscillators@1.1')(layered());
		expect(study.choices).toHaveLength(3);
		expect(study.choices[2].name).toBe('with silica-two-oscillators@1.1');
		expect(study.choices[2].changes.right).toEqual({ version: 'silica-two-oscillators@1.1' });
		expect(study.choices[2].changes.left2).toEqual({ version: 'outer-b@1.0' });
	});

	it('are renamed and lose their ions', () => {
		const ions = edits.setChoiceIons(0, 'none')(edits.renameChoice(0, 'dry')(layered()));
		expect(ions.choices[0]).toEqual({ name: 'dry', changes: {}, debyeLengthNm: 'none' });
		expect(edits.setChoiceIons(0, undefined)(ions).choices[0]).toEqual({ name: 'dry', changes: {} });
	});
});
