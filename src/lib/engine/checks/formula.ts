import { ELEMENTS } from './elements.ts';

export interface FormulaUnit {
	/** g/mol */
	molarMass: number;
	electrons: number;
}

const TOKEN = /([A-Z][a-z]?)|(\()|(\))|(\d+(?:\.\d+)?)/y;

/** Mass and electrons of a chemical formula, brackets included; null where it is none ("(C2F4)n" has no count). */
export function formulaUnit(formula: string): FormulaUnit | null {
	const stack: FormulaUnit[] = [{ molarMass: 0, electrons: 0 }];
	let last: FormulaUnit | null = null;
	let at = 0;
	const add = (unit: FormulaUnit, count: number) => {
		const top = stack[stack.length - 1];
		top.molarMass += unit.molarMass * count;
		top.electrons += unit.electrons * count;
	};
	while (at < formula.length) {
		TOKEN.lastIndex = at;
		const match = TOKEN.exec(formula);
		if (!match) return null;
		at = TOKEN.lastIndex;
		const [, symbol, open, close, digits] = match;
		if (digits !== undefined) {
			if (!last) return null;
			// One was counted already when the element or the bracket came.
			add(last, Number(digits) - 1);
			last = null;
		} else if (open !== undefined) {
			stack.push({ molarMass: 0, electrons: 0 });
			last = null;
		} else if (close !== undefined) {
			if (stack.length < 2) return null;
			last = stack.pop() ?? null;
			if (last) add(last, 1);
		} else {
			const element = ELEMENTS.get(symbol);
			if (!element) return null;
			last = { molarMass: element.molarMass, electrons: element.atomicNumber };
			add(last, 1);
		}
	}
	return stack.length === 1 && stack[0].electrons > 0 ? stack[0] : null;
}
