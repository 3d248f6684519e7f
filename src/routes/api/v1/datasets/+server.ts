import { datasetFields } from '$lib/schemas/dataset.ts';
import { addDataset } from '$lib/server/library/additions.ts';
import { createdJson } from '$lib/server/library/created.ts';
import type { RequestHandler } from './$types';

export const POST: RequestHandler = (event) =>
	createdJson(event, datasetFields, async (actor, fields) => {
		await addDataset(actor, fields);
		const { slug, title, material } = fields;
		return {
			dataset: {
				slug,
				title,
				material,
				latest: null,
				links: { material: `/api/v1/materials/${material}`, versions: `/api/v1/datasets/${slug}/versions` }
			}
		};
	});
