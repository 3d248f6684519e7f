/** Lower case and without accents, so that "rakic" finds Rakić; the same for what is kept and what is looked for. */
export const folded = (text: string): string => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();

/** More words than these would only slow a search down; nobody types them. */
const WORDS_MAX = 8;

export const searchWords = (search: string): string[] =>
	folded(search)
		.split(/\s+/)
		.filter((word) => word !== '')
		.slice(0, WORDS_MAX);

/** A pattern for LIKE that finds the word anywhere; its own wildcards are taken literally. */
export const containing = (word: string): string => `%${word.replace(/[\\%_]/g, '\\$&')}%`;
