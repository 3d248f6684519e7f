import { materialsByPlace } from './analysis/places.ts';
import { parameterAt } from './analysis/model-parameters.ts';
import type { ForceRequest, MaterialModel, Uncertainty } from './contract.ts';
import { ENGINE_LIMITS as limits } from './limits.ts';
import type { Issue } from './refusal.ts';
import { checkRange } from './validate-number.ts';

/** How many separations the long answers are given for, and whether rivals name places that exist. */
export function checkExtras(issues: Issue[], request: ForceRequest): void {
	const { include, separationsNm, rivals, arrangement } = request;
	const count = Array.isArray(separationsNm) ? separationsNm.length : separationsNm.count;
	for (const [extra, most] of [
		['sensitivity', limits.sensitivitySeparations],
		['uncertainty', limits.uncertaintySeparations]
	] as const) {
		if (include.includes(extra) && count > most)
			issues.push({
				path: 'include',
				message: `asks for ${extra} at ${count} separations; the engine gives it for up to ${most} at once`
			});
	}
	if (rivals === undefined) return;
	if (rivals.length > limits.rivals)
		issues.push({
			path: 'rivals',
			message: `has ${rivals.length} entries; the engine takes up to ${limits.rivals}`
		});
	const places = materialsByPlace(arrangement);
	rivals.forEach((rival, i) => {
		if (rival.places.length === 0)
			issues.push({ path: `rivals[${i}].places`, message: 'names no place: a rival stands somewhere' });
		rival.places.forEach((place, j) => {
			if (!places.has(place))
				issues.push({
					path: `rivals[${i}].places[${j}]`,
					message: `is "${place}"; the arrangement has ${[...places.keys()].join(', ')}`
				});
		});
	});
}

/** A stated uncertainty that fits the model beside it. */
export function checkUncertainty(
	issues: Issue[],
	at: string,
	{ permittivity, uncertainty }: MaterialModel
): void {
	if (uncertainty === undefined) return;
	const path = `${at}.uncertainty`;
	if (permittivity.kind === 'idealConductor') {
		issues.push({ path, message: 'an ideal conductor has no permittivity to be uncertain of: leave it out' });
	} else if (uncertainty.kind === 'scale') {
		checkRange(issues, `${path}.relative`, uncertainty.relative, limits.relativeUncertainty);
	} else if (uncertainty.kind === 'table') checkTable(issues, path, permittivity.kind, uncertainty);
	else checkParameters(issues, path, permittivity, uncertainty);
}

function checkTable(
	issues: Issue[],
	path: string,
	kind: string,
	{ energiesEv, relative }: Extract<Uncertainty, { kind: 'table' }>
): void {
	if (kind !== 'table') {
		issues.push({
			path: `${path}.kind`,
			message: 'is "table" on a model that is none: use scale or parameters'
		});
		return;
	}
	if (
		energiesEv.length < 1 ||
		energiesEv.length > limits.tableRows ||
		relative.length !== energiesEv.length
	) {
		issues.push({
			path: `${path}.relative`,
			message: `has ${relative.length} values for ${energiesEv.length} energies`
		});
		return;
	}
	if (energiesEv.some((energy, i) => !(energy > 0) || (i > 0 && energy <= energiesEv[i - 1])))
		issues.push({ path: `${path}.energiesEv`, message: 'must be above zero and ascend' });
	relative.forEach((one, i) => checkRange(issues, `${path}.relative[${i}]`, one, limits.relativeUncertainty));
}

function checkParameters(
	issues: Issue[],
	path: string,
	model: MaterialModel['permittivity'],
	{ names, covariance }: Extract<Uncertainty, { kind: 'parameters' }>
): void {
	if (names.length < 1 || names.length > limits.uncertainParameters) {
		issues.push({
			path: `${path}.names`,
			message: `has ${names.length} entries; the engine takes 1 to ${limits.uncertainParameters}`
		});
		return;
	}
	names.forEach((name, i) => {
		if (parameterAt(model, name) === undefined)
			issues.push({
				path: `${path}.names[${i}]`,
				message: `is "${name}"; the model has no such number (write it like plasmaEnergyEv or terms[0].dampingEv)`
			});
	});
	const size = names.length;
	if (covariance.length !== size || covariance.some((row) => row.length !== size)) {
		issues.push({ path: `${path}.covariance`, message: `must have ${size} rows of ${size} numbers` });
	} else if (!isCovariance(covariance)) {
		issues.push({
			path: `${path}.covariance`,
			message:
				'is no covariance: it must be symmetric, without negative variances, and correlations at most one'
		});
	}
}

/** Symmetric and not negative in any direction: pivots of the scaled matrix, up to rounding. */
function isCovariance(given: readonly (readonly number[])[]): boolean {
	const scale = given.map((row, i) => Math.sqrt(row[i]));
	if (scale.some((one) => !Number.isFinite(one))) return false;
	const a = given.map((row, i) =>
		row.map((value, j) => (scale[i] * scale[j] === 0 ? value : value / (scale[i] * scale[j])))
	);
	for (let i = 0; i < a.length; i++)
		for (let j = 0; j < i; j++) if (!(Math.abs(a[i][j] - a[j][i]) <= 1e-9)) return false;
	for (let k = 0; k < a.length; k++) {
		if (a[k][k] < -1e-9) return false;
		for (let i = k + 1; i < a.length; i++) {
			if (a[k][k] < 1e-9) {
				if (Math.abs(a[i][k]) > 1e-4) return false;
				continue;
			}
			for (let j = k + 1; j < a.length; j++) a[i][j] -= (a[i][k] * a[k][j]) / a[k][k];
		}
	}
	return true;
}
