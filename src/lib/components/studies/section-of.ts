import { lengthText } from '../../format/length.ts';
import { materialIn } from '../../schemas/study-slots.ts';
import type { ModelChoice, Side, Study } from '../../schemas/study.ts';
import type { SectionBody, SectionMaterial } from '../plot/section.ts';
import { plainName } from '../../study-sheet/title-block.ts';
import type { VersionFacts } from '../../study-sheet/version-facts.ts';

/** The cross-section of the arrangement; materials that only a choice has are not drawn. */
export function sectionOf(
	study: Study,
	facts: Record<string, VersionFacts>
): { left: SectionBody; medium: SectionMaterial; right: SectionBody } {
	const asArranged: ModelChoice = { name: '', changes: {} };
	const material = (slot: string): SectionMaterial => {
		const version = materialIn(study, asArranged, slot)?.version ?? '';
		const known = facts[version]?.material;
		return {
			name: known ? plainName(known.name).toLowerCase() : version,
			materialClass: known?.class ?? 'gas'
		};
	};
	const body = (side: Side): SectionBody => ({
		substrate: material(side),
		layers: study[side].layers.map(({ thicknessNm }, index) => {
			const of = material(`${side}${index + 1}`);
			return { ...of, thicknessNm, label: `${of.name}, ${lengthText(thicknessNm)}` };
		})
	});
	return { left: body('left'), medium: material('medium'), right: body('right') };
}
