import { and, asc, eq, sql } from 'drizzle-orm';
import { evaluationsIn } from '../../screening/cells.ts';
import {
	HAZARD_RANKS,
	SCREENING_ACCURACY,
	SCREENING_LIMITS,
	type PlanMaterial,
	type PlanPart,
	type ScreeningPlan,
	type ScreeningSide,
	type ScreeningStatement
} from '../../schemas/screening.ts';
import { database } from '../db/client.ts';
import { dataset, version } from '../db/schema/dataset.ts';
import { material } from '../db/schema/material.ts';
import { InvalidInput, type Issue } from '../errors.ts';

/** From what is wanted to what is computed: every version named, every arrangement counted, the cost said. */

/** Seconds of one core for one arrangement at one separation, bench of DEVELOPERS.md; T = 0 integrates over frequency. */
const SECONDS_PER_EVALUATION = 1.4e-4;
const ZERO_TEMPERATURE_FACTOR = 5;

interface Candidate extends PlanMaterial {
	recommended: boolean;
	/** Of its dataset. */
	newest: boolean;
	measuredHighEv: number | null;
	text: string;
}

const hazardOf = (signalWord: string | null | undefined): PlanMaterial['hazard'] =>
	signalWord?.toLowerCase() === 'danger'
		? 'danger'
		: signalWord?.toLowerCase() === 'warning'
			? 'warning'
			: 'none';

/** Every published version, the one to prefer of each material first. */
async function published(): Promise<Candidate[]> {
	const rows = await database()
		.select({
			slug: dataset.slug,
			major: version.major,
			minor: version.minor,
			checksum: version.checksum,
			quality: version.quality,
			conducts: version.conducts,
			measuredHighEv: version.measuredHighEv,
			recommended: sql<boolean>`(${dataset.recommendedMajor}, ${dataset.recommendedMinor}) is not distinct from (${version.major}, ${version.minor})`,
			material: material.slug,
			name: material.name,
			class: material.class,
			formula: material.formula,
			hazards: material.hazards,
			title: dataset.title
		})
		.from(version)
		.innerJoin(dataset, eq(version.datasetId, dataset.id))
		.innerJoin(material, eq(dataset.materialId, material.id))
		.where(and(eq(version.state, 'published')))
		.orderBy(asc(material.slug));
	const newest = new Map<string, number>();
	for (const { slug, major, minor } of rows)
		newest.set(slug, Math.max(newest.get(slug) ?? 0, major * 1e6 + minor));
	return rows
		.map((row) => ({
			ref: `${row.slug}@${row.major}.${row.minor}`,
			checksum: row.checksum,
			slug: row.material,
			name: row.name,
			class: row.class,
			hazard: hazardOf(row.hazards?.signalWord),
			conducts: row.conducts,
			quality: row.quality,
			recommended: row.recommended,
			newest: newest.get(row.slug) === row.major * 1e6 + row.minor,
			measuredHighEv: row.measuredHighEv,
			text: `${row.name} ${row.formula ?? ''} ${row.title} ${row.slug}`.toLowerCase()
		}))
		.sort(byPreference);
}

/** What the curators recommend, then what nothing supersedes, then what was checked, then by name. */
function byPreference(one: Candidate, other: Candidate): number {
	return (
		one.slug.localeCompare(other.slug) ||
		Number(other.recommended) - Number(one.recommended) ||
		Number(other.newest) - Number(one.newest) ||
		Number(other.quality === 'checked') - Number(one.quality === 'checked') ||
		numbered(one).dataset.localeCompare(numbered(other).dataset) ||
		numbered(other).number - numbered(one).number
	);
}

function numbered({ ref }: Candidate): { dataset: string; number: number } {
	const [slug, number] = ref.split('@');
	const [major, minor] = number.split('.').map(Number);
	return { dataset: slug, number: major * 1e6 + minor };
}

function wanted(all: readonly Candidate[], side: ScreeningSide): Candidate[] {
	const words = (side.search ?? '').toLowerCase().split(/\s+/).filter(Boolean);
	return all.filter((one) => {
		if (side.versions && side.versions.length > 0) return side.versions.includes(one.ref);
		if (side.class === 'solid' && (one.class === 'liquid' || one.class === 'gas')) return false;
		if (side.class !== undefined && side.class !== 'solid' && side.class !== one.class) return false;
		if (words.some((word) => !one.text.includes(word))) return false;
		if (side.hazard && HAZARD_RANKS.indexOf(one.hazard) > HAZARD_RANKS.indexOf(side.hazard)) return false;
		return (
			side.measuredToEv === undefined ||
			one.measuredHighEv === null ||
			one.measuredHighEv >= side.measuredToEv
		);
	});
}

/** Places of the versions of one side, gathered by material. */
class Side {
	readonly parts: PlanPart[] = [];
	#groups = new Map<string, number>();

	constructor(
		private readonly materials: PlanMaterial[],
		private readonly places: Map<string, number>
	) {}

	add(one: Candidate, reference: boolean, coating?: { of: Candidate; thicknessNm: number }): void {
		const key = `${one.slug} ${coating ? `${coating.of.slug} ${coating.thicknessNm}` : ''}`;
		const group = this.#groups.get(key) ?? this.#groups.size;
		this.#groups.set(key, group);
		this.parts.push({
			group,
			of: this.#place(one),
			...(coating ? { coating: { of: this.#place(coating.of), thicknessNm: coating.thicknessNm } } : {}),
			reference
		});
	}

	#place({ ref, checksum, slug, name, class: kind, hazard, conducts, quality }: Candidate): number {
		const known = this.places.get(ref);
		if (known !== undefined) return known;
		this.places.set(ref, this.materials.length);
		this.materials.push({ ref, checksum, slug, name, class: kind, hazard, conducts, quality });
		return this.materials.length - 1;
	}
}

function thicknesses(coating: NonNullable<ScreeningSide['coating']>): number[] {
	const { thicknessNm } = coating;
	if (typeof thicknessNm === 'number') return [thicknessNm];
	const { from, to, count } = thicknessNm;
	return Array.from({ length: count }, (_, index) =>
		Number((from * (to / from) ** (index / (count - 1))).toPrecision(6))
	);
}

/** @throws InvalidInput naming the side that nothing fits, a version that is not there, or the limit that is passed */
export async function planScreening(statement: ScreeningStatement): Promise<ScreeningPlan> {
	const all = await published();
	const byRef = new Map(all.map((one) => [one.ref, one]));
	const materials: PlanMaterial[] = [];
	const places = new Map<string, number>();
	const issues: Issue[] = [];

	const side = (name: string, asked: ScreeningSide): PlanPart[] => {
		for (const ref of asked.versions ?? [])
			if (!byRef.has(ref))
				issues.push({ path: `${name}.versions`, message: `there is no published version ${ref}` });
		const found = wanted(all, asked);
		if (found.length === 0 && issues.length === 0)
			issues.push({ path: name, message: 'nothing that is published fits: widen the filter' });
		const coat = asked.coating && byRef.get(asked.coating.of);
		if (asked.coating && !coat)
			issues.push({
				path: `${name}.coating.of`,
				message: `there is no published version ${asked.coating.of}`
			});
		const parts = new Side(materials, places);
		const seen = new Set<string>();
		for (const one of found) {
			const reference = !seen.has(one.slug);
			seen.add(one.slug);
			if (!reference && statement.rivals === 'recommended' && !asked.versions?.length) continue;
			if (coat && asked.coating)
				for (const thicknessNm of thicknesses(asked.coating))
					parts.add(one, reference, { of: coat, thicknessNm });
			else parts.add(one, reference);
		}
		if (parts.parts.length > SCREENING_LIMITS.bodies)
			issues.push({
				path: name,
				message: `${parts.parts.length} bodies, at most ${SCREENING_LIMITS.bodies}: narrow the filter`
			});
		return parts.parts;
	};

	const left = side('left', statement.left);
	const media = side('medium', statement.medium);
	const right = statement.right ? side('right', statement.right) : left;
	if (issues.length > 0) throw new InvalidInput('The screening cannot be planned.', issues);
	const plan: ScreeningPlan = {
		...{ materials, left, media, right },
		symmetric: !statement.right,
		temperaturesK: [statement.temperatureK].flat(),
		rules: [...new Set(statement.rules)],
		separationsNm: statement.separationsNm,
		relativeAccuracy: SCREENING_ACCURACY
	};
	const evaluations = evaluationsIn(plan);
	if (evaluations > SCREENING_LIMITS.evaluations)
		throw new InvalidInput(
			`That is ${evaluations.toLocaleString('en')} evaluations; at most ${SCREENING_LIMITS.evaluations.toLocaleString('en')} are screened at once.`,
			[{ path: 'statement', message: 'fewer bodies, media, separations, temperatures or rules' }],
			'too-costly'
		);
	return plan;
}

/** Of one core. */
export function estimatedSeconds(plan: ScreeningPlan): number {
	const cold = plan.temperaturesK.filter((temperature) => temperature === 0).length;
	const each = evaluationsIn(plan) / plan.temperaturesK.length;
	return each * (plan.temperaturesK.length - cold + cold * ZERO_TEMPERATURE_FACTOR) * SECONDS_PER_EVALUATION;
}
