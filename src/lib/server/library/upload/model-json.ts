import type { PermittivityModel } from '../../../engine/contract.ts';
import { permittivityModel } from '../../../schemas/permittivity.ts';
import { parseInput } from '../../api/issues.ts';
import { InvalidInput } from '../../errors.ts';

/** @throws InvalidInput naming what is wrong inside the JSON, as `model.terms[0].energyEv` */
export function readModelJson(text: string): PermittivityModel {
	let read: unknown;
	try {
		read = JSON.parse(text);
	} catch (error) {
		const why = error instanceof Error ? error.message : 'it cannot be read';
		throw new InvalidInput('The model is not JSON.', [{ path: 'model', message: why }]);
	}
	try {
		return parseInput(permittivityModel, read, 'The model is not one that the engine knows.');
	} catch (error) {
		if (!(error instanceof InvalidInput)) throw error;
		const issues = error.issues.map(({ path, message }) => ({ path: `model.${path}`, message }));
		throw new InvalidInput(error.message, issues);
	}
}
