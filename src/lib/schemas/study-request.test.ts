import { describe, expect, it } from 'vitest';
import { forceRequest } from './force.ts';
import { choiceRequest, curveSeparations } from './study-request.ts';
import { WORKED_STUDY } from './study-worked.ts';

describe('the request of a model choice', () => {
	it('lays the changes of the choice over the arrangement', () => {
		const [first, second] = WORKED_STUDY.choices.map((choice) => choiceRequest(WORKED_STUDY, choice));
		expect(first.arrangement.medium).toEqual(WORKED_STUDY.medium);
		expect(second.arrangement.medium).toEqual(WORKED_STUDY.choices[1].changes.medium);
		expect(second.arrangement.left).toEqual(first.arrangement.left);
	});

	it('is a request that the API takes', () => {
		const study = structuredClone(WORKED_STUDY);
		study.right.layers.push({ of: { version: 'gold-drude@1.0' }, thicknessNm: 12.5 });
		study.choices[0].changes.right1 = { zeroFrequency: 'plasma' };
		const request = choiceRequest(study, study.choices[0]);
		expect(forceRequest.safeParse(request).success).toBe(true);
		expect(request.arrangement.right.layers).toEqual([
			{ of: { version: 'gold-drude@1.0', zeroFrequency: 'plasma' }, thicknessNm: 12.5 }
		]);
	});

	it('takes a rule back where a choice says "written", and ions out where it says "none"', () => {
		const study = structuredClone(WORKED_STUDY);
		study.left.substrate.zeroFrequency = 'plasma';
		study.debyeLengthNm = 10;
		study.choices[1] = { name: '', changes: { left: { zeroFrequency: 'written' } }, debyeLengthNm: 'none' };
		const [first, second] = study.choices.map((choice) => choiceRequest(study, choice).arrangement);
		expect(first.left.substrate).toEqual({ version: 'gold-lorentz-drude@1.0', zeroFrequency: 'plasma' });
		expect(first.debyeLengthNm).toBe(10);
		expect(second.left.substrate).toEqual({ version: 'gold-lorentz-drude@1.0' });
		expect(second.debyeLengthNm).toBeUndefined();
	});

	it('asks for no more than 400 separations however wide the axis', () => {
		expect(curveSeparations({ ...WORKED_STUDY, fromNm: 0.1, toNm: 1e6 }).count).toBe(400);
		expect(curveSeparations({ ...WORKED_STUDY, fromNm: 10, toNm: 20 }).count).toBe(21);
	});
});
