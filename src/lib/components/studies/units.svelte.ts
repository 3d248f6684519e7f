import { readUnitChoices, type UnitChoices, type UnitName } from '../../format/units.ts';

/** Units that the reader fixed, kept in the reader's own browser and never in data. */

const KEY = 'hairsbreadth.units';

export class UnitMemory {
	choices = $state.raw<UnitChoices>({});

	/** In the browser only, where the memory is; what was never fixed there is as the account begins with. */
	recall(ofAccount: UnitChoices = {}): void {
		this.choices = ofAccount;
		try {
			this.choices = { ...ofAccount, ...readUnitChoices(localStorage.getItem(KEY)) };
		} catch {
			// A browser that forbids storage still shows units; they are only not remembered.
		}
	}

	fix(name: UnitName, symbol: string | undefined): void {
		const { [name]: _before, ...rest } = this.choices;
		this.choices = symbol === undefined ? rest : { ...rest, [name]: symbol };
		try {
			localStorage.setItem(KEY, JSON.stringify(this.choices));
		} catch {
			// As above.
		}
	}
}
