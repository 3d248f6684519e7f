import { columnsCsv, columnsJson, curveColumns } from '../../format/curve-columns.ts';
import { ENGINE_VERSION, epsilonShares } from '../../engine/index.ts';
import type { ForcePoint } from '../../engine/contract.ts';
import { curveSeparationsNm } from '../../schemas/curve-separations.ts';
import { forceRequest } from '../../schemas/force.ts';
import { decodeStudy } from '../../schemas/study-address.ts';
import { encodeStudy } from '../../schemas/study-encode.ts';
import { choiceRequest } from '../../schemas/study-request.ts';
import { choiceLetter, versionsOf } from '../../schemas/study-slots.ts';
import type { Study } from '../../schemas/study.ts';
import { sheetSvg, type Sheet } from '../../study-sheet/sheet.ts';
import { now } from '../clock.ts';
import { planForces, runForces } from '../compute/forces.ts';
import { InvalidInput, NotFound } from '../errors.ts';
import { bibtex, sourceText } from '../library/citation.ts';
import { ris } from '../library/citation-files.ts';
import { factsOf } from '../library/facts-of.ts';
import * as versions from '../library/versions.ts';
import { onceEach } from '../records/citation.ts';
import { drawnSheet } from '../records/drawn-sheet.ts';
import { sheetPdf } from '../records/sheet-pdf.ts';

/** Files of a study that stands in an address, saved or not: computed for whoever asks. */

const TYPES = {
	'sheet.pdf': 'application/pdf',
	'sheet.svg': 'image/svg+xml',
	'curves.csv': 'text/csv; charset=utf-8',
	'curves.json': 'application/json',
	'citation.bib': 'application/x-bibtex; charset=utf-8',
	'citation.ris': 'application/x-research-info-systems; charset=utf-8'
} as const;

type FileName = keyof typeof TYPES;

const isFile = (name: string): name is FileName => Object.hasOwn(TYPES, name);

interface Asking {
	/** Told the seconds that the computation will take, before it begins. */
	charge: (seconds: number) => Promise<void>;
	origin: string;
	signal: AbortSignal;
}

/** @throws NotFound for another name; InvalidInput where the study cannot be read or computed */
export async function studyFile(
	query: URLSearchParams,
	name: string,
	asking: Asking
): Promise<{ name: string; type: string; content: string | Uint8Array }> {
	if (!isFile(name))
		throw new NotFound(`A study has no file “${name}”. It has ${Object.keys(TYPES).join(', ')}.`);
	const { study, problems } = decodeStudy(query);
	if (problems.length > 0)
		throw new InvalidInput(
			'The address has parts that cannot be read.',
			problems.map(({ part, message }) => ({ path: part, message }))
		);
	return { name: `study-${name}`, type: TYPES[name], content: await contentOf(study, name, asking) };
}

async function contentOf(study: Study, name: FileName, asking: Asking): Promise<string | Uint8Array> {
	if (name === 'citation.bib' || name === 'citation.ris') return citations(study, name, asking.origin);
	const answers = await computed(study, asking);
	const sheet = await sheetOf(study, answers, `${asking.origin}/${encodeStudy(study)}`);
	if (name === 'sheet.pdf') return sheetPdf(sheet, now().toISOString());
	if (name === 'sheet.svg') return sheetSvg(sheet);
	const perLength = study.shape.kind === 'cylinderPlate' || study.shape.kind === 'parallelCylinders';
	const columns = curveColumns(answers, perLength ? 'N/m' : 'N', [
		sheet.title,
		...sheet.block,
		...(await used(study)).flatMap(({ ref, checksum, sources }) => [
			`${ref} ${checksum}`,
			...sources.map((source) => `source: ${sourceText(source)}`)
		])
	]);
	return name === 'curves.csv' ? columnsCsv(columns) : columnsJson(columns);
}

const used = async (study: Study) => [...(await versions.resolve(versionsOf(study))).values()];

async function citations(study: Study, name: FileName, origin: string): Promise<string> {
	const details = await Promise.all(
		versionsOf(study).map((ref) => {
			const [slug, number] = ref.split('@');
			return versions.get(slug, number);
		})
	);
	return name === 'citation.bib'
		? onceEach(details.map((detail) => bibtex(detail, origin))).bib()
		: onceEach(details.map((detail) => ris(detail, origin))).ris();
}

interface Answer {
	letter: string;
	points: ForcePoint[];
}

async function computed(study: Study, { charge, signal }: Asking): Promise<Answer[]> {
	const separations = curveSeparationsNm(study);
	const plans = await Promise.all(
		study.choices.map((choice) => planForces(forceRequest.parse(choiceRequest(study, choice, separations))))
	);
	await charge(plans.reduce((sum, { costSeconds }) => sum + costSeconds, 0));
	const answers: Answer[] = [];
	for (const [index, plan] of plans.entries()) {
		const ignore = { onStart: () => undefined, onPoints: () => undefined };
		answers.push({ letter: choiceLetter(index), points: (await runForces(plan, ignore, signal)).points });
	}
	return answers;
}

async function sheetOf(study: Study, answers: readonly Answer[], address: string): Promise<Sheet> {
	const facts = Object.fromEntries((await used(study)).map((one) => [one.ref, factsOf(one, epsilonShares)]));
	return drawnSheet({
		...{ study, facts, answers, address },
		engine: ENGINE_VERSION,
		computedAt: now().toISOString()
	});
}
