import { decodeStudy } from '$lib/schemas/study-address.ts';
import { open } from '$lib/server/studies/links.ts';
import { notesTree } from '$lib/server/studies/notes.ts';
import { answered } from '../../../(library)/answered.ts';
import { loadStudy } from '../../load-study.ts';
import type { PageServerLoad } from './$types';

export const load: PageServerLoad = ({ params, setHeaders }) =>
	answered(async () => {
		const { study: saved, until } = await open(params.secret);
		setHeaders({ 'cache-control': 'private, no-store', 'x-robots-tag': 'noindex' });
		const loaded = await loadStudy(new URLSearchParams(saved.query));
		const { study } = decodeStudy(new URLSearchParams(saved.query));
		return {
			...loaded,
			name: saved.name,
			owner: saved.owner,
			savedAt: saved.savedAt,
			reasons: saved.reasons,
			query: saved.query,
			choices: study.choices.map(({ name }) => name),
			notes: notesTree(saved.notes),
			secret: params.secret,
			until
		};
	});
