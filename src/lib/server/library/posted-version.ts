import { z } from 'zod';
import { permittivityModel } from '../../schemas/permittivity.ts';
import { modelDescription, tableDescription } from '../../schemas/upload.ts';
import { parseInput } from '../api/issues.ts';
import { InvalidInput } from '../errors.ts';
import { readJson } from '../limits/read-json.ts';
import { BadRequest } from '../limits/refusals.ts';
import type { RawFile } from './drafts.ts';
import type { PermittivityModel } from '../../engine/contract.ts';
import type { ModelDescription, TableDescription } from '../../schemas/upload.ts';
import { sha256 } from './canonical.ts';
import { UPLOAD_BYTES_MAX } from './upload/decode.ts';
import { RefusedFile } from './upload/refused-file.ts';

/** The two bodies that make a version: a file with its description, or a model with its description. */

export type PostedVersion =
	| { raw: RawFile; description: TableDescription }
	| { model: PermittivityModel; description: ModelDescription };

/** The parts around the file are small; what the adapter lets through is little more than the file itself. */
const BODY_MAX = UPLOAD_BYTES_MAX + 200_000;
const JSON_MAX = 4_000_000;
const NAME_MAX = 200;

const tableFile = z.strictObject({ description: tableDescription });
const described = z.strictObject({ model: permittivityModel, description: modelDescription });

/** As read from the wire, with what identifies it when it is sent again. */
export async function readPostedVersion(
	request: Request
): Promise<{ posted: () => PostedVersion; content: unknown }> {
	const type = request.headers.get('content-type')?.split(';')[0].trim().toLowerCase();
	if (type !== 'multipart/form-data') {
		const body = await readJson(request, JSON_MAX);
		return { content: body, posted: () => parseInput(described, body) };
	}
	const form = await readForm(request);
	const file = form.get('file');
	const description = form.get('description');
	if (!(file instanceof File) || typeof description !== 'string') {
		throw new InvalidInput('The request is not whole.', [
			...(file instanceof File ? [] : [{ path: 'file', message: 'send the table as a part named file' }]),
			...(typeof description === 'string'
				? []
				: [{ path: 'description', message: 'send the description as JSON in a part named description' }])
		]);
	}
	if (file.size > UPLOAD_BYTES_MAX) throw tooLarge();
	const raw = { name: fileName(file.name), bytes: Buffer.from(await file.arrayBuffer()) };
	return {
		content: [raw.name, sha256(raw.bytes), description],
		posted: () => ({
			raw,
			description: parseInput(tableFile, { description: parseJson(description) }).description
		})
	};
}

const tooLarge = () =>
	new BadRequest(413, 'too-large', `A file may have at most ${UPLOAD_BYTES_MAX.toLocaleString('en')} bytes.`);

async function readForm(request: Request): Promise<FormData> {
	if (Number(request.headers.get('content-length') ?? 0) > BODY_MAX) throw tooLarge();
	try {
		return await request.formData();
	} catch (error) {
		if ((error as { status?: unknown }).status === 413) throw tooLarge();
		throw new BadRequest(400, 'malformed', 'The body is not multipart/form-data as its header says.');
	}
}

function parseJson(text: string): unknown {
	try {
		return JSON.parse(text);
	} catch {
		throw new InvalidInput('The description is not JSON.', [
			{ path: 'description', message: 'write it as one JSON object' }
		]);
	}
}

/** A name for the downloads: one line, no folders. */
export function fileName(given: string): string {
	const name = given
		.replace(/[\p{Cc}\p{Cs}]/gu, '')
		.split(/[\\/]/)
		.pop()
		?.trim();
	return name ? name.slice(0, NAME_MAX) : 'upload.txt';
}

/** What is no text file, or too long to be read, is told by the status as well. */
export function asFileProblem(error: unknown): unknown {
	if (!(error instanceof RefusedFile)) return error;
	const [{ rule, message }] = error.issues;
	if (rule === 'binary') return new BadRequest(415, 'not-text', `The file was not taken: ${message}.`);
	if (rule === 'size') return tooLarge();
	return error;
}
