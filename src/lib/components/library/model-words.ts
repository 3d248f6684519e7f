import type {
	HighEnd,
	LowEnd,
	PermittivityModel,
	TaucLorentzTerm,
	TemperatureLaw
} from '../../engine/contract.ts';
import { evFromRadPerS } from '../../engine/units.ts';

/** A permittivity model as a reader checks it against a paper: the formula of each part and its figures, unrounded. */

export interface ModelPart {
	name: string;
	/** Set by MathLine. */
	formula: string;
	/** Heads with their units, set by MathLine. */
	columns: string[];
	rows: string[][];
	notes: string[];
}

const part = (name: string, formula: string, over: Partial<ModelPart> = {}): ModelPart => ({
	name,
	formula,
	columns: [],
	rows: [],
	notes: [],
	...over
});

const plasmaColumn = 'ħω_{p} / eV';
const dampingColumn = 'ħγ / eV';
/** The second unit is a help to the eye; six figures are more than any fit has. */
const inEv = (radPerS: number) => String(Number(evFromRadPerS(radPerS).toPrecision(6)));

function lowEndWords(end: LowEnd): string {
	switch (end.kind) {
		case 'drude':
			return `Below the table: the absorption of a Drude metal with plasma energy ${end.plasmaEnergyEv} eV and damping ${end.dampingEv} eV.`;
		case 'plasma':
			return `Below the table: no absorption, and a plasma term with plasma energy ${end.plasmaEnergyEv} eV.`;
		case 'power':
			return `Below the table: absorption proportional to the frequency to the power ${end.exponent}, joined at the first point.`;
		case 'none':
			return 'Below the table: no absorption.';
	}
}

function highEndWords(end: HighEnd): string {
	return end.kind === 'power'
		? `Above the table: absorption falling with the frequency to the power ${end.exponent}, joined at the last point.`
		: 'Above the table: no absorption.';
}

const bandRow = ({ amplitudeEv, energyEv, broadeningEv, gapEv }: TaucLorentzTerm): string[] =>
	[amplitudeEv, energyEv, broadeningEv, gapEv].map(String);

function mixturePart({
	kind,
	fraction
}: Extract<PermittivityModel, { kind: 'maxwellGarnett' | 'bruggeman' }>): ModelPart {
	return kind === 'bruggeman'
		? part('Bruggeman mixture', 'Σ f_{j}(ε_{j} − ε) / (ε_{j} + 2ε) = 0', {
				notes: [`Volume fraction ${fraction} of the second phase in the first; both follow.`]
			})
		: part('Maxwell Garnett mixture', '(ε − ε_{h}) / (ε + 2ε_{h}) = f(ε_{i} − ε_{h}) / (ε_{i} + 2ε_{h})', {
				notes: [`Volume fraction ${fraction} of the inclusion in the host; host, then inclusion, follow.`]
			});
}

function lawsPart({ rangeK, laws }: Extract<PermittivityModel, { kind: 'temperatureDependent' }>): ModelPart {
	return part('Temperature', `T = ${rangeK.from} to ${rangeK.to} K`, {
		columns: ['parameter', 'law'],
		rows: laws.map(({ parameter, law }) => [parameter, lawWords(law)]),
		notes: ['The figures above hold at the temperature of the sample; in a study each law sets its own.']
	});
}

const POWERS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** One term of a polynomial with its sign: "245.02", "− 0.79069 T/K", "+ 0.00073 (T/K)²". */
function termWords(coefficient: number, variable: string, power: number): string {
	if (power === 0) return String(coefficient).replace('-', '−');
	const sign = coefficient < 0 ? '−' : '+';
	const raised =
		power === 1 ? variable : `(${variable})${[...String(power)].map((d) => POWERS[Number(d)]).join('')}`;
	return `${sign} ${Math.abs(coefficient)} ${raised}`;
}

function lawWords(law: TemperatureLaw): string {
	switch (law.kind) {
		case 'polynomial': {
			const t = law.scale === 'celsius' ? 't/°C' : 'T/K';
			return law.coefficients.map((c, power) => termWords(c, t, power)).join(' ');
		}
		case 'arrhenius':
			return `${law.value} exp[${law.activationK} K (1/T − 1/${law.referenceK} K)]`;
		case 'blochGruneisen':
			return `${law.value} at ${law.referenceK} K, Bloch-Grüneisen, Debye temperature ${law.debyeK} K, residual share ${law.residualShare}`;
	}
}

/** The parts that add up; a sum inside a sum is one sum. */
export function modelParts(model: PermittivityModel): ModelPart[] {
	switch (model.kind) {
		case 'sum':
			return model.of.flatMap(modelParts);
		case 'temperatureDependent':
			return [...modelParts(model.of), lawsPart(model)];
		case 'maxwellGarnett':
		case 'bruggeman':
			return [mixturePart(model), ...modelParts(model.host), ...modelParts(model.inclusion)];
		case 'brendelBormann':
			return [
				part(
					'Brendel-Bormann oscillators',
					'ε(iξ) − 1 = Σ ∫ N(x; ω_{j}, σ_{j}) f_{j} / (x^{2} + ξ^{2} + γ_{j}ξ) dx',
					{
						columns: ['f_{j} / eV^{2}', 'ħω_{j} / eV', 'ħγ_{j} / eV', 'ħσ_{j} / eV'],
						rows: model.terms.map(({ strengthEv2, energyEv, dampingEv, widthEv }) =>
							[strengthEv2, energyEv, dampingEv, widthEv].map(String)
						),
						notes: ['At zero frequency resonances below a fifth of the centre are left out.']
					}
				)
			];
		case 'taucLorentz':
			return [
				part(
					'Tauc-Lorentz bands',
					'ε″(ω) = Σ AE_{0}C(E − E_{g})^{2} / E[(E^{2} − E_{0}^{2})^{2} + C^{2}E^{2}]',
					{
						columns: ['A / eV', 'E_{0} / eV', 'C / eV', 'E_{g} / eV'],
						rows: model.terms.map(bandRow),
						notes: ['On the imaginary axis by the Kramers-Kronig integral.']
					}
				)
			];
		case 'codyLorentz':
			return [
				part(
					'Cody-Lorentz bands',
					'ε″(ω) = Σ (E − E_{g})^{2} / [(E − E_{g})^{2} + E_{p}^{2}] · AE_{0}CE / [(E^{2} − E_{0}^{2})^{2} + C^{2}E^{2}]',
					{
						columns: ['A / eV', 'E_{0} / eV', 'C / eV', 'E_{g} / eV', 'E_{p} / eV'],
						rows: model.terms.map((term) => [...bandRow(term), String(term.transitionEv)]),
						notes: ['On the imaginary axis by the Kramers-Kronig integral; no absorption below the gap.']
					}
				)
			];
		case 'sellmeier':
			return [
				part('Index formula', 'n^{2} − 1 = a + Σ B_{j}λ^{2} / (λ^{2} − L_{j}^{2})', {
					columns: ['B_{j}', 'L_{j} / µm'],
					rows: model.terms.map((term) => [String(term.strength), String(term.wavelengthUm)]),
					notes: [
						`Constant a = ${model.constant}. Poles in the infrared are oscillators; the others and the constant become one ultraviolet oscillator by a Cauchy plot from ${model.bandUm.from} to ${model.bandUm.to} µm, because such poles are aids of fitting.`
					]
				})
			];
		case 'vacuum':
			return [part('Vacuum', 'ε(iξ) = 1')];
		case 'constant':
			return [part('Constant', 'ε(iξ) = ε', { columns: ['ε'], rows: [[String(model.value)]] })];
		case 'idealConductor':
			return [part('Ideal conductor', 'r_{TM} = 1, r_{TE} = −1')];
		case 'drude':
			return [
				part('Drude', 'ε(iξ) − 1 = ω_{p}^{2} / ξ(ξ + γ)', {
					columns: [plasmaColumn, dampingColumn],
					rows: [[String(model.plasmaEnergyEv), String(model.dampingEv)]]
				})
			];
		case 'plasma':
			return [
				part('Plasma', 'ε(iξ) − 1 = ω_{p}^{2} / ξ^{2}', {
					columns: [plasmaColumn],
					rows: [[String(model.plasmaEnergyEv)]]
				})
			];
		case 'lorentz':
			return [
				part('Lorentz oscillators', 'ε(iξ) − 1 = Σ f_{j} / (ω_{j}^{2} + ξ^{2} + γ_{j}ξ)', {
					columns: ['f_{j} / eV^{2}', 'ħω_{j} / eV', 'ħγ_{j} / eV'],
					rows: model.terms.map((term) => [
						String(term.strengthEv2),
						String(term.energyEv),
						String(term.dampingEv)
					])
				})
			];
		case 'debye':
			return [
				part('Debye relaxation', 'ε(iξ) − 1 = Σ d_{j} / (1 + ξτ_{j})', {
					columns: ['d_{j}', 'τ_{j} / ps'],
					rows: model.terms.map((term) => [String(term.strength), String(term.relaxationTimePs)])
				})
			];
		case 'ninhamParsegian':
			return [
				part('Undamped oscillators', 'ε(iξ) − 1 = Σ C_{j} / (1 + ξ^{2}/ω_{j}^{2})', {
					columns: ['C_{j}', 'ω_{j} / rad s^{−1}', 'ħω_{j} / eV'],
					rows: model.terms.map((term) => [
						String(term.strength),
						term.frequencyRadPerS.toExponential().replace('e+', 'e'),
						inEv(term.frequencyRadPerS)
					])
				})
			];
		case 'dcConductivity':
			return [
				part('Conductivity at zero frequency', 'ε(iξ) − 1 = σ / ε_{0}ξ', {
					columns: ['σ / S m^{−1}'],
					rows: [[String(model.siemensPerM)]]
				})
			];
		case 'table':
			return [
				part('Table', 'ε(iξ) − 1 = (2/π) ∫ ωε″(ω) / (ω^{2} + ξ^{2}) dω', {
					columns: ['rows', 'first, ħω / eV', 'last, ħω / eV'],
					rows: [
						[
							String(model.energiesEv.length),
							String(model.energiesEv[0]),
							String(model.energiesEv[model.energiesEv.length - 1])
						]
					],
					notes: [
						'Between the points the absorption is a straight line on logarithmic axes.',
						lowEndWords(model.lowEnd),
						highEndWords(model.highEnd)
					]
				})
			];
		case 'imaginaryTable':
			return [
				part('Table on the imaginary axis', 'ε(iξ)', {
					columns: ['rows', 'first ξ / rad s^{−1}', 'last ξ / rad s^{−1}'],
					rows: [
						[
							String(model.frequenciesRadPerS.length),
							String(model.frequenciesRadPerS[0]),
							String(model.frequenciesRadPerS[model.frequenciesRadPerS.length - 1])
						]
					],
					notes: ['Between the points a monotone curve in the logarithm of the frequency.']
				})
			];
	}
}
