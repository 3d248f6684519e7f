import type { SavedRecord } from '../../schemas/record.ts';
import { plain, recordPath } from './citation.ts';

/** The plain text that goes with an archive: what each file is, and how to check and recompute the numbers without us. */

const FILES = `FILES

README.txt            this text
record.json           the record; its SHA-256 is the name of the record
inputs/X.json         what the engine was given for model choice X, models in full; its SHA-256 is the input
                      checksum of that choice in record.json
models/*.json         the permittivity model of each version; its SHA-256 is the checksum that record.json states
tables/*.csv          the measured rows of each version that has any, as they were given, with names and units
results/curves.csv    all curves: comment lines, a row of names, a row of units, rows
results/curves.json   the same by column
citations.*           the record, each version and each original source: text, BibTeX, RIS
SHA256SUMS            of all of these; "sha256sum -c SHA256SUMS" checks them`;

const FORMULA = `THE NUMBERS

Free energy per area F, pressure P = -dF/dd and its gradient dP/dd between two parallel layered bodies at distance d
across a medium, by the Lifshitz formula

  F(d) = (kT / 2 pi) sum' over n = 0, 1, 2, ... of
         integral over k from 0 to infinity of k [ln(1 - r_TE,L r_TE,R e^(-2 q d)) + ln(1 - r_TM,L r_TM,R e^(-2 q d))]

where the prime gives n = 0 half weight, xi_n = 2 pi n kT / hbar, q^2 = k^2 + eps_m(i xi_n) mu_m(i xi_n) xi_n^2 / c^2 in the
medium m, and r are the reflection amplitudes of the two bodies seen from the medium, layers included. At T = 0 the sum is
an integral, (hbar / 2 pi) over d xi. Constants are those of the SI of 2019.

A single surface between medium m and body b: r_TM = (eps_b q_m - eps_m q_b) / (eps_b q_m + eps_m q_b), and r_TE the same
with mu in the place of eps. A layer of thickness t between m and b: r = (r_m1 + r_1b e^(-2 q_1 t)) / (1 + r_m1 r_1b e^(-2 q_1 t)).

The term n = 0 is the limit xi -> 0 of the model, or what "zeroFrequency" of a material says: "drude": r_TE = 0, r_TM = 1;
"plasma": r_TM = 1 and r_TE with k^2 + (omega_p / c)^2 inside the body, omega_p the plasma frequency of its free carriers;
"ideal": both of magnitude 1; "dcIgnored": without free carriers. With a Debye length or salt in the medium its TM part has
q^2 = k^2 + kappa^2 in the medium; with ions "off" it is left out.

Models on the imaginary axis, E = hbar xi in eV, each giving eps - 1: "drude" wp^2 / (E^2 + g E); "plasma" wp^2 / E^2;
"lorentz" the sum of strength / (w0^2 + E^2 + g E); "debye" the sum of strength / (1 + xi tau); "ninhamParsegian" the sum of
strength / (1 + (xi / frequency)^2); "dcConductivity" sigma / (eps_0 xi); "sum" adds what its parts give. A "table" has eps''
over photon energy and gives (2 / pi) integral of w eps''(w) / (w^2 + xi^2) dw: between two rows eps'' is a power law (a straight
line where one of them is zero), beyond its ends what "lowEnd" and "highEnd" say. An "imaginaryTable" has eps(i xi) itself, joined
by monotone cubics of ln(eps - 1) over ln xi. Other kinds are known by the names of their authors. Units stand in the names.

For curved shapes forces follow by the proximity rule, F_sphere = 2 pi R F(d) and its like; the "shapeError" estimates what
that neglects. "errorBound" is relative to the value and bounds the numerical error of F, P and dP/dd.`;

export function recipe(record: SavedRecord, origin: string): string {
	const { content, checksum } = record;
	const { choices } = content;
	const at = choices[0].points[Math.floor(choices[0].points.length / 2)];
	return [
		`${content.name}\n${content.title}\n\n${plain(record, origin)}`,
		`Frozen ${content.frozenAt} with engine ${content.engine} on ${content.runtime}.`,
		FILES,
		`TO CHECK

1. "sha256sum -c SHA256SUMS" in this folder.
2. "sha256sum record.json" prints ${checksum}.
3. For example, choice ${choices[0].letter} at ${at.separationNm} nm: P = ${at.pressurePa} Pa, known to
   ${at.errorBound.pressure} of its value.

TO RECOMPUTE

With an installation that holds the versions: open ${origin}${recordPath(checksum)} and press "Recompute",
or send "request" of a choice in record.json to POST /api/v1/forces. With an installation that does not: send
inputs/X.json, which names no version. On the same engine and runtime every bit comes out again; on another one the
numbers agree within the sum of both bounds.

Without any: evaluate the formula below with the models in inputs/X.json.`,
		FORMULA,
		content.choices
			.map(({ letter, name, reason, inputChecksum }) =>
				[`CHOICE ${letter}: ${name}`, reason && `Why: ${reason}`, inputChecksum].filter(Boolean).join('\n')
			)
			.join('\n\n'),
		content.notes && `NOTES (Markdown)\n\n${content.notes}`,
		''
	]
		.filter((part) => part !== '')
		.join('\n\n')
		.concat('\n');
}
