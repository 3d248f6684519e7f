import { z } from 'zod';
import { createDocument, type CreateDocumentOptions, type ZodOpenApiPathsObject } from 'zod-openapi';
import { ENGINE_VERSION } from '../../engine/version.ts';
import { materialChoiceDescribed } from '../../schemas/force.ts';
import { withCuration } from './openapi-curation.ts';
import { forcePaths } from './openapi-forces.ts';
import { libraryPaths } from './openapi-library.ts';
import { peoplePaths } from './openapi-people.ts';
import { screeningPaths } from './openapi-screenings.ts';
import { studyPaths } from './openapi-studies.ts';

/** The description of the API, made from the schemas that check what comes in and out. */

export const API_BASE = '/api/v1';

const paths: ZodOpenApiPathsObject = {
	...forcePaths,
	...withCuration(libraryPaths),
	...peoplePaths,
	...studyPaths,
	...screeningPaths
};

const [pinned, inPlace] = materialChoiceDescribed.options;

const override: CreateDocumentOptions['override'] = ({ jsonSchema, zodSchema }) => {
	// While parsing, a material is told apart by its field `version`; drawn, it is one of two objects.
	if (z.globalRegistry.get(zodSchema)?.id === 'MaterialChoice' && zodSchema._zod.def.type === 'pipe') {
		jsonSchema.anyOf = [reference('PinnedMaterial'), reference('InPlaceMaterial')];
	}
	// Sums and mixtures hold models; the depth to which they may nest is checked, not drawn.
	const kind = jsonSchema.properties?.kind;
	if (typeof kind !== 'object' || !jsonSchema.properties) return;
	const model = reference('PermittivityModel');
	if (kind.const === 'sum') jsonSchema.properties.of = { type: 'array', minItems: 1, items: model };
	if (kind.const === 'temperatureDependent') jsonSchema.properties.of = model;
	if (kind.const === 'maxwellGarnett' || kind.const === 'bruggeman')
		Object.assign(jsonSchema.properties, { host: model, inclusion: model });
};

function reference(id: string): { $ref: string } {
	return { $ref: `#/components/schemas/${id}` };
}

let document: ReturnType<typeof createDocument> | undefined;

export function openApiDocument(): ReturnType<typeof createDocument> {
	document ??= createDocument(
		{
			openapi: '3.1.0',
			info: {
				title: 'Hairsbreadth',
				version: ENGINE_VERSION,
				description:
					'Permittivity data with their origin, and the Lifshitz forces that follow from them. Field names carry their ' +
					'unit; negative energy, pressure and force attract; every number of a curve carries a bound on its error.',
				license: { name: 'Apache-2.0', identifier: 'Apache-2.0' }
			},
			servers: [{ url: API_BASE }],
			paths,
			components: { schemas: { PinnedMaterial: pinned, InPlaceMaterial: inPlace } }
		},
		{ override }
	);
	return document;
}
