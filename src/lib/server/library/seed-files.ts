import { readFile, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { z } from 'zod';
import { datasetSlug } from '../../schemas/dataset.ts';
import { materialFields } from '../../schemas/material.ts';
import { permittivityModel } from '../../schemas/permittivity.ts';
import { sourceFields } from '../../schemas/source.ts';
import { modelDescription, tableDescription } from '../../schemas/upload.ts';
import { versionNumber } from '../../schemas/version.ts';
import { canonicalJson, sha256 } from './canonical.ts';

/** The folder data-seed, read and checked: sources, and a folder for each material. */

const common = {
	dataset: z.strictObject({ slug: datasetSlug, title: z.string().min(1) }),
	number: versionNumber,
	/** Code of a warning to the reason why it stands. */
	answers: z.record(z.string(), z.string().min(1)).default({})
};

const seedVersion = z.union([
	z.strictObject({ ...common, model: permittivityModel, description: modelDescription }),
	z.strictObject({ ...common, file: z.string(), description: tableDescription })
]);

export type SeedVersion = z.infer<typeof seedVersion>;

/** A part of the seed with a name that stays and a digest that moves when its content does. */
export interface SeedPart<Content> {
	name: string;
	digest: string;
	content: Content;
}

export interface SeedFiles {
	sources: SeedPart<z.infer<typeof sourceFields>>[];
	materials: SeedPart<z.infer<typeof materialFields>>[];
	versions: SeedPart<{ material: string; version: SeedVersion; raw: Buffer | null }>[];
}

/** @throws Error naming the file and the field that does not fit */
export async function readSeedFiles(folder: string): Promise<SeedFiles> {
	const sources = await readJson(join(folder, 'sources.json'), z.array(sourceFields));
	const names = (await readdir(folder, { withFileTypes: true }))
		.filter((entry) => entry.isDirectory())
		.map((entry) => entry.name)
		.sort();
	const folders = await Promise.all(names.map((name) => readMaterial(folder, name)));
	return {
		sources: sources.map((content) => part(`source/${content.slug}`, content)),
		materials: folders.map(({ material }) => part(`material/${material.slug}`, material)),
		versions: folders.flatMap(({ versions }) => versions)
	};
}

async function readMaterial(folder: string, name: string) {
	const files = (await readdir(join(folder, name))).filter((file) => file.endsWith('.json')).sort();
	const material = await readJson(join(folder, name, 'material.json'), materialFields);
	const versions = await Promise.all(
		files
			.filter((file) => file !== 'material.json')
			.map(async (file) => {
				const version = await readJson(join(folder, name, file), seedVersion);
				const raw = 'file' in version ? await readFile(join(folder, name, version.file)) : null;
				const label = `version/${version.dataset.slug}@${version.number}`;
				return part(label, { material: material.slug, version, raw }, raw);
			})
	);
	return { material, versions };
}

function part<Content extends object>(
	name: string,
	content: Content,
	raw: Buffer | null = null
): SeedPart<Content> {
	const described = 'raw' in content ? { ...content, raw: raw && sha256(raw) } : content;
	return { name, digest: sha256(canonicalJson(described)), content };
}

async function readJson<T>(path: string, schema: z.ZodType<T>): Promise<T> {
	const parsed = schema.safeParse(JSON.parse(await readFile(path, 'utf8')));
	if (parsed.success) return parsed.data;
	throw new Error(`${path} does not fit:\n${z.prettifyError(parsed.error)}`);
}
