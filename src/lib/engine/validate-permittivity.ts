import type { HighEnd, LowEnd, PermittivityModel, TaucLorentzTerm } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import type { Issue } from './refusal.ts';
import { mixtureIssues, sellmeierIssues, thermalIssues } from './validate-composed.ts';
import { checkRange } from './validate-number.ts';

/** Problems of one list are named up to here; a file with a thousand bad rows needs no thousand lines. */
const MOST_ROWS_NAMED = 10;

/** Everything that is wrong with a permittivity model; a passive, causal model of sensible size gives an empty list. */
export function permittivityIssues(model: PermittivityModel, path: string, depth = 0): Issue[] {
	const issues: Issue[] = [];
	switch (model.kind) {
		case 'vacuum':
		case 'idealConductor':
			break;
		case 'constant':
			checkRange(issues, `${path}.value`, model.value, limits.constant);
			break;
		case 'drude':
			checkRange(issues, `${path}.plasmaEnergyEv`, model.plasmaEnergyEv, limits.plasmaEnergyEv, 'eV');
			checkRange(issues, `${path}.dampingEv`, model.dampingEv, limits.dampingEv, 'eV');
			break;
		case 'plasma':
			checkRange(issues, `${path}.plasmaEnergyEv`, model.plasmaEnergyEv, limits.plasmaEnergyEv, 'eV');
			break;
		case 'lorentz':
			eachTerm(issues, path, model.terms, (term, at) => {
				checkRange(issues, `${at}.strengthEv2`, term.strengthEv2, limits.strengthEv2, 'eV^2');
				checkRange(issues, `${at}.energyEv`, term.energyEv, limits.energyEv, 'eV');
				checkRange(issues, `${at}.dampingEv`, term.dampingEv, limits.dampingEv, 'eV');
			});
			break;
		case 'debye':
			eachTerm(issues, path, model.terms, (term, at) => {
				checkRange(issues, `${at}.strength`, term.strength, limits.strength);
				checkRange(issues, `${at}.relaxationTimePs`, term.relaxationTimePs, limits.relaxationTimePs, 'ps');
			});
			break;
		case 'ninhamParsegian':
			eachTerm(issues, path, model.terms, (term, at) => {
				checkRange(issues, `${at}.strength`, term.strength, limits.strength);
				checkRange(issues, `${at}.frequencyRadPerS`, term.frequencyRadPerS, limits.frequencyRadPerS, 'rad/s');
			});
			break;
		case 'dcConductivity':
			checkRange(issues, `${path}.siemensPerM`, model.siemensPerM, limits.siemensPerM, 'S/m');
			break;
		case 'table':
			checkTable(issues, path, model);
			break;
		case 'imaginaryTable':
			checkImaginaryTable(issues, path, model.frequenciesRadPerS, model.epsilon);
			break;
		case 'brendelBormann':
			eachTerm(issues, path, model.terms, (term, at) => {
				checkRange(issues, `${at}.strengthEv2`, term.strengthEv2, limits.strengthEv2, 'eV^2');
				checkRange(issues, `${at}.energyEv`, term.energyEv, limits.bandEv, 'eV');
				checkRange(issues, `${at}.dampingEv`, term.dampingEv, limits.dampingEv, 'eV');
				checkRange(issues, `${at}.widthEv`, term.widthEv, limits.bandEv, 'eV');
			});
			break;
		case 'taucLorentz':
			eachTerm(issues, path, model.terms, (term, at) => checkBand(issues, at, term));
			break;
		case 'codyLorentz':
			eachTerm(issues, path, model.terms, (term, at) => {
				checkBand(issues, at, term);
				checkRange(issues, `${at}.transitionEv`, term.transitionEv, limits.bandEv, 'eV');
			});
			break;
		case 'sellmeier':
			eachTerm(issues, path, model.terms, () => undefined);
			if (issues.length === 0) issues.push(...sellmeierIssues(model, path));
			break;
		case 'sum':
			checkSum(issues, path, model.of, depth);
			break;
		case 'maxwellGarnett':
		case 'bruggeman':
		case 'temperatureDependent': {
			if (depth >= limits.nesting) {
				issues.push({ path, message: `models are nested deeper than ${limits.nesting}` });
				break;
			}
			const inner = (part: PermittivityModel, at: string): Issue[] => permittivityIssues(part, at, depth + 1);
			const found =
				model.kind === 'temperatureDependent'
					? thermalIssues(model, path, inner)
					: mixtureIssues(model, path, inner);
			issues.push(...found);
			break;
		}
		default:
			issues.push({ path: `${path}.kind`, message: 'is not a permittivity model the engine knows' });
	}
	return issues;
}

function checkBand(issues: Issue[], at: string, term: TaucLorentzTerm): void {
	checkRange(issues, `${at}.amplitudeEv`, term.amplitudeEv, limits.amplitudeEv, 'eV');
	checkRange(issues, `${at}.energyEv`, term.energyEv, limits.bandEv, 'eV');
	checkRange(issues, `${at}.broadeningEv`, term.broadeningEv, limits.bandEv, 'eV');
	checkRange(issues, `${at}.gapEv`, term.gapEv, limits.gapEv, 'eV');
}

function eachTerm<T>(issues: Issue[], path: string, terms: T[], check: (term: T, at: string) => void): void {
	if (!Array.isArray(terms) || terms.length === 0 || terms.length > limits.terms) {
		const count = Array.isArray(terms) ? terms.length : 'no list';
		issues.push({
			path: `${path}.terms`,
			message: `has ${count}; the engine takes 1 to ${limits.terms} terms`
		});
		return;
	}
	terms.forEach((term, i) => check(term, `${path}.terms[${i}]`));
}

function checkSum(issues: Issue[], path: string, parts: PermittivityModel[], depth: number): void {
	if (depth >= limits.nesting) {
		issues.push({
			path,
			message: `sums are nested deeper than ${limits.nesting}; write the parts side by side`
		});
		return;
	}
	if (!Array.isArray(parts) || parts.length === 0 || parts.length > limits.terms) {
		issues.push({ path: `${path}.of`, message: `a sum has 1 to ${limits.terms} parts` });
		return;
	}
	parts.forEach((part, i) => {
		if (part.kind === 'idealConductor') {
			issues.push({
				path: `${path}.of[${i}]`,
				message: 'an ideal conductor has no permittivity that could be added'
			});
			return;
		}
		issues.push(...permittivityIssues(part, `${path}.of[${i}]`, depth + 1));
	});
}

/** Lengths, size and order of the abscissae; false where going on makes no sense. */
function checkColumns(
	issues: Issue[],
	path: string,
	name: string,
	x: number[],
	y: number[],
	yName: string
): boolean {
	if (
		!Array.isArray(x) ||
		!Array.isArray(y) ||
		x.length !== y.length ||
		x.length < 2 ||
		x.length > limits.tableRows
	) {
		issues.push({
			path: `${path}.${name}`,
			message: `needs 2 to ${limits.tableRows} rows, as many as ${yName}`
		});
		return false;
	}
	let named = 0;
	for (let i = 0; i < x.length && named < MOST_ROWS_NAMED; i++) {
		if (!Number.isFinite(x[i]) || !(x[i] > 0)) {
			issues.push({ path: `${path}.${name}[${i}]`, message: 'must be a finite number above 0' });
			named++;
		} else if (i > 0 && x[i] <= x[i - 1]) {
			issues.push({
				path: `${path}.${name}[${i}]`,
				message: `is ${x[i]} after ${x[i - 1]}; the column must ascend`
			});
			named++;
		}
	}
	return named === 0;
}

function checkTable(
	issues: Issue[],
	path: string,
	model: Extract<PermittivityModel, { kind: 'table' }>
): void {
	const { energiesEv, epsilon2 } = model;
	if (checkColumns(issues, path, 'energiesEv', energiesEv, epsilon2, 'epsilon2')) {
		checkRange(
			issues,
			`${path}.energiesEv[${energiesEv.length - 1}]`,
			energiesEv[energiesEv.length - 1],
			limits.energyEv,
			'eV'
		);
		let named = 0;
		for (let i = 0; i < epsilon2.length && named < MOST_ROWS_NAMED; i++) {
			if (!checkRange(issues, `${path}.epsilon2[${i}]`, epsilon2[i], limits.epsilon2)) named++;
		}
	}
	checkLowEnd(issues, `${path}.lowEnd`, model.lowEnd);
	checkHighEnd(issues, `${path}.highEnd`, model.highEnd);
}

function checkLowEnd(issues: Issue[], path: string, end: LowEnd): void {
	if (end.kind === 'drude' || end.kind === 'plasma') {
		checkRange(issues, `${path}.plasmaEnergyEv`, end.plasmaEnergyEv, limits.plasmaEnergyEv, 'eV');
	}
	if (end.kind === 'drude') checkRange(issues, `${path}.dampingEv`, end.dampingEv, limits.dampingEv, 'eV');
	if (end.kind === 'power') checkRange(issues, `${path}.exponent`, end.exponent, limits.lowExponent);
}

function checkHighEnd(issues: Issue[], path: string, end: HighEnd): void {
	if (end.kind === 'power') checkRange(issues, `${path}.exponent`, end.exponent, limits.highExponent);
}

function checkImaginaryTable(issues: Issue[], path: string, frequencies: number[], epsilon: number[]): void {
	if (!checkColumns(issues, path, 'frequenciesRadPerS', frequencies, epsilon, 'epsilon')) return;
	let named = 0;
	for (let i = 0; i < epsilon.length && named < MOST_ROWS_NAMED; i++) {
		const at = `${path}.epsilon[${i}]`;
		if (!checkRange(issues, at, epsilon[i], { min: 1, max: limits.epsilon2.max })) {
			named++;
		} else if (i > 0 && epsilon[i] > epsilon[i - 1]) {
			issues.push({
				path: at,
				message: `is ${epsilon[i]} after ${epsilon[i - 1]}; eps(i xi) of a passive medium never rises`
			});
			named++;
		}
	}
}
