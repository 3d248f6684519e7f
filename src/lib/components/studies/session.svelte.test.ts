import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { decodeStudy } from '../../schemas/study-address.ts';
import { WORKED_STUDY } from '../../schemas/study-worked.ts';
import { addChoice, setConditions, swapBodies } from '../arrangement/edits.ts';
import { StudySession } from './session.svelte.ts';

function aSession() {
	const went: { temperatureK: number; replace: boolean }[] = [];
	const noted: string[] = [];
	const session = new StudySession(WORKED_STUDY, {
		go: (query, { replace }) => {
			went.push({ temperatureK: decodeStudy(new URLSearchParams(query)).study.temperatureK, replace });
		},
		note: (query) => noted.push(query)
	});
	return { session, went, noted };
}

describe('a session', () => {
	beforeEach(() => void vi.useFakeTimers());
	afterEach(() => void vi.useRealTimers());

	it('undoes and redoes edits one by one', () => {
		const { session } = aSession();
		session.edit(swapBodies());
		session.edit(addChoice());
		session.undo();
		expect(session.study.choices).toHaveLength(2);
		session.undo();
		expect(session.study).toEqual(WORKED_STUDY);
		expect(session.canUndo).toBe(false);
		session.redo();
		expect(session.study.left).toEqual(WORKED_STUDY.right);
		session.edit(setConditions({ temperatureK: 77 }));
		expect(session.canRedo).toBe(false);
	});

	it('takes the keys of one field as one step, and a pause as its end', () => {
		const { session, went } = aSession();
		session.edit(setConditions({ temperatureK: 3 }), 'T');
		session.edit(setConditions({ temperatureK: 31 }), 'T');
		vi.advanceTimersByTime(3000);
		session.edit(setConditions({ temperatureK: 310 }), 'T');
		expect(went).toEqual([
			{ temperatureK: 3, replace: false },
			{ temperatureK: 31, replace: true },
			{ temperatureK: 310, replace: false }
		]);
		session.undo();
		session.undo();
		expect(session.study.temperatureK).toBe(300);
	});

	it('remembers fifty steps and no more', () => {
		const { session } = aSession();
		for (let step = 1; step <= 60; step++) session.edit(setConditions({ temperatureK: step }));
		for (let step = 0; step < 60; step++) session.undo();
		expect(session.study.temperatureK).toBe(10);
	});

	it('writes the hairline into the address when it rests, not while it moves', () => {
		const { session, noted } = aSession();
		session.move(50.123456);
		session.move(60.123456);
		expect(session.study.atNm).toBe(38);
		vi.advanceTimersByTime(500);
		expect(session.study.atNm).toBe(60.12);
		expect(noted).toHaveLength(1);
	});

	it('does not lose a moving hairline to an edit', () => {
		const { session } = aSession();
		session.move(50);
		session.edit(swapBodies());
		expect(session.study.atNm).toBe(50);
	});

	it('parks a line, moves it, and takes it away where it stands', () => {
		const { session } = aSession();
		session.park();
		expect(session.study.parkedNm).toBe(38);
		session.move(90);
		session.park();
		expect(session.study.parkedNm).toBe(90);
		session.park();
		expect(session.study).not.toHaveProperty('parkedNm');
	});

	it('takes over what the address means after the browser went back, and nothing where they agree', () => {
		const { session } = aSession();
		session.adopt({ ...WORKED_STUDY });
		expect(session.canUndo).toBe(false);
		session.adopt({ ...WORKED_STUDY, temperatureK: 4 });
		expect(session.study.temperatureK).toBe(4);
		session.undo();
		expect(session.study.temperatureK).toBe(300);
	});
});
