import type {
	ArrangementOf,
	BodyOf,
	ForceRequest,
	MaterialModel,
	PermittivityModel,
	Uncertainty
} from '../../engine/contract.ts';
import type {
	ForceRequestComplete,
	MaterialChoice,
	NormalChoice,
	PermittivityChoice,
	Phase
} from '../../schemas/force.ts';
import { InvalidInput, type Issue } from '../errors.ts';
import { canonicalJson, sha256 } from '../library/canonical.ts';

/** From what a caller asks to what the engine computes: pinned versions replaced by their models. */

/** A material of a request with its place, as `arrangement.left.layers[0].of`. */
interface Slot {
	path: string;
	choice: MaterialChoice;
}

export function slotsOf({ left, medium, right }: ArrangementOf<MaterialChoice>): Slot[] {
	const body = (side: 'left' | 'right', { layers, substrate }: BodyOf<MaterialChoice>): Slot[] => [
		...layers.map(({ of }, index) => ({ path: `arrangement.${side}.layers[${index}].of`, choice: of })),
		{ path: `arrangement.${side}.substrate`, choice: substrate }
	];
	return [...body('left', left), { path: 'arrangement.medium', choice: medium }, ...body('right', right)];
}

/** Rivals name versions too. */
function everySlot({ arrangement, rivals = [] }: ForceRequestComplete): Slot[] {
	const others = rivals.map(({ of }, index) => ({ path: `rivals[${index}].of`, choice: of }));
	return [...slotsOf(arrangement), ...others];
}

/** The versions that a request names, each once, in the order of their first appearance. */
export function pinnedVersions(request: ForceRequestComplete): string[] {
	return [...new Set(everySlot(request).flatMap((slot) => namedIn(slot).map(({ version }) => version)))];
}

/** The versions that a slot names, its own, that along its axis and those of a mixture, each with its path. */
function namedIn({ path, choice }: Slot): { path: string; version: string }[] {
	const named: { path: string; version: string }[] = [];
	const add = (at: string, of: object): void => {
		if ('version' in of && typeof of.version === 'string') named.push({ path: at, version: of.version });
	};
	add(path, choice);
	if (choice.normal) add(`${path}.normal`, choice.normal);
	if ('permittivity' in choice && isMixture(choice.permittivity)) {
		add(`${path}.permittivity.host`, choice.permittivity.host);
		add(`${path}.permittivity.inclusion`, choice.permittivity.inclusion);
	}
	return named;
}

const isMixture = (
	model: PermittivityChoice
): model is Extract<PermittivityChoice, { kind: 'maxwellGarnett' | 'bruggeman' }> =>
	model.kind === 'maxwellGarnett' || model.kind === 'bruggeman';

/**
 * @param modelOf the model of a pinned version; undefined where there is none
 * @param statedBy the uncertainty that came with a version's table; what the request states goes before it
 * @throws InvalidInput naming every slot whose version does not exist
 */
export function resolveRequest(
	request: ForceRequestComplete,
	modelOf: (version: string) => PermittivityModel | undefined,
	statedBy: (version: string) => Uncertainty | null | undefined = () => null
): ForceRequest {
	const missing: Issue[] = everySlot(request)
		.flatMap(namedIn)
		.filter(({ version }) => !modelOf(version))
		.map(({ path, version }) => ({
			path: `${path}.version`,
			message: `there is no published version ${version}`
		}));
	if (missing.length > 0) {
		throw new InvalidInput(
			'The request names a version that the library does not have.',
			missing,
			'unknown-version'
		);
	}
	const phase = (of: Phase): PermittivityModel =>
		'version' in of ? (modelOf(of.version) as PermittivityModel) : of;
	const along = (normal: NormalChoice | undefined): Pick<MaterialModel, 'normal'> => {
		if (normal === undefined) return {};
		return {
			normal: { permittivity: 'version' in normal ? phase({ version: normal.version }) : normal.permittivity }
		};
	};
	const material = (choice: MaterialChoice): MaterialModel => {
		if (!('version' in choice)) {
			const { permittivity, normal, ...given } = choice;
			const mixed = isMixture(permittivity)
				? { ...permittivity, host: phase(permittivity.host), inclusion: phase(permittivity.inclusion) }
				: permittivity;
			return { permittivity: mixed, ...along(normal), ...given };
		}
		const permittivity = modelOf(choice.version) as PermittivityModel;
		const { version: _version, normal, ...said } = choice;
		// Nothing is looked up that the answer would not show: it would only make equal questions look different.
		const stated = request.include.includes('uncertainty') ? statedBy(choice.version) : null;
		return { permittivity, ...along(normal), ...(stated ? { uncertainty: stated } : {}), ...said };
	};
	const body = ({ layers, substrate }: BodyOf<MaterialChoice>): BodyOf<MaterialModel> => ({
		layers: layers.map(({ of, thicknessNm }) => ({ of: material(of), thicknessNm })),
		substrate: material(substrate)
	});
	const { left, medium, right, ...rest } = request.arrangement;
	const { rivals, ...asked } = request;
	return {
		...asked,
		arrangement: { ...rest, left: body(left), medium: material(medium), right: body(right) },
		...(rivals ? { rivals: rivals.map(({ places, of }) => ({ places, of: material(of) })) } : {})
	};
}

/**
 * Names a computation by everything that its numbers follow from, so that equal questions are recognised however they
 * were written: field order, spelled-out defaults, a pinned version or its model in place make no difference.
 */
export function inputChecksum(request: ForceRequest): string {
	return sha256(canonicalJson(request));
}
