import type { PermittivityModel, Uncertainty } from '../../engine/contract.ts';
import type { AbscissaUnit } from '../../schemas/upload.ts';
import { PHOTON_ENERGY_EV } from './upload/photon-energy.ts';

/** What a stored table said about its own uncertainty, as the engine takes it. */

interface GivenRows {
	model: PermittivityModel;
	/** The unit is one of an upload's. */
	columns: { abscissaUnit: string; quantities: string[] } | null;
	abscissa: readonly number[] | null;
	first: readonly number[] | null;
	second: readonly number[] | null;
	uncertainties: readonly { quantity: string; values: readonly number[] }[] | null;
}

/** A relative uncertainty above this says that the point is not known at all. */
const LARGEST = 10;

/**
 * Relative standard uncertainties of eps'' row by row: of 2 n k from those of n and k, or of epsilon2 itself. Rows count as
 * independent of each other, since a column says nothing about what they have in common; a calibration that moves all of them
 * is stated with the request. Null where no uncertainty came with the table, or only one of eps', which carries no force.
 */
export function statedUncertainty({
	model,
	columns,
	abscissa,
	first,
	second,
	uncertainties
}: GivenRows): Uncertainty | null {
	if (model.kind !== 'table' || !columns || !abscissa || !uncertainties) return null;
	const given = [first, second];
	const parts = columns.quantities.flatMap((quantity, index) => {
		const stated = uncertainties.find((one) => one.quantity === quantity)?.values;
		const values = given[index];
		return quantity === 'epsilon1' || !stated || !values ? [] : [{ stated, values }];
	});
	if (parts.length === 0) return null;
	const toEv = PHOTON_ENERGY_EV[columns.abscissaUnit as AbscissaUnit];
	const rows = abscissa.map((value, i) => ({
		energyEv: toEv(value),
		relative: Math.min(
			LARGEST,
			Math.hypot(...parts.map(({ stated, values }) => (values[i] === 0 ? 0 : stated[i] / values[i])))
		)
	}));
	rows.sort((a, b) => a.energyEv - b.energyEv);
	// Equal rows that an upload merged are one point.
	const distinct = rows.filter(({ energyEv }, i) => i === 0 || energyEv > rows[i - 1].energyEv);
	return {
		kind: 'table',
		energiesEv: distinct.map(({ energyEv }) => energyEv),
		relative: distinct.map(({ relative }) => relative),
		correlation: 'independent'
	};
}
