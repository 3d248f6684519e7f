import { z } from 'zod';
import { datasetWithVersions } from './dataset.ts';
import { materialSummary } from './material.ts';

/** A material with its datasets and their versions; apart from material.ts so that the two need not import each other. */
export const materialDetail = materialSummary
	.extend({ datasets: z.array(datasetWithVersions) })
	.meta({ id: 'MaterialDetail' });

export type MaterialDetail = z.infer<typeof materialDetail>;
