import type { BodyOf, ForceRequest, MaterialModel } from './contract.ts';
import { atTemperature, thermalParts } from './permittivity/temperature.ts';

/** A material with every law of temperature carried out; the same object where there is none. */
export function materialAt(material: MaterialModel, kelvin: number): MaterialModel {
	const { permittivity, normal } = material;
	const follows = [permittivity, ...(normal ? [normal.permittivity] : [])].some(
		(model) => thermalParts(model).length > 0
	);
	if (!follows) return material;
	return {
		...material,
		permittivity: atTemperature(permittivity, kelvin),
		...(normal ? { normal: { permittivity: atTemperature(normal.permittivity, kelvin) } } : {})
	};
}

/** The request at its own temperature: all that computes sees parameters, not laws. */
export function atItsTemperature(request: ForceRequest): ForceRequest {
	const { arrangement, rivals } = request;
	const at = (material: MaterialModel): MaterialModel => materialAt(material, arrangement.temperatureK);
	const body = ({ layers, substrate }: BodyOf<MaterialModel>): BodyOf<MaterialModel> => ({
		layers: layers.map((layer) => ({ ...layer, of: at(layer.of) })),
		substrate: at(substrate)
	});
	return {
		...request,
		arrangement: {
			...arrangement,
			left: body(arrangement.left),
			medium: at(arrangement.medium),
			right: body(arrangement.right)
		},
		...(rivals ? { rivals: rivals.map((rival) => ({ ...rival, of: at(rival.of) })) } : {})
	};
}
