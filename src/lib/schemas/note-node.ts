/** Notes as a tree of elements that a page draws itself: no markup is ever handed on as text. */
export type NoteNode = string | NoteElement;

export interface NoteElement {
	tag: NoteTag;
	/** Of a link. */
	href?: string;
	children: NoteNode[];
}

export const NOTE_TAGS = [
	'p',
	'strong',
	'em',
	's',
	'code',
	'pre',
	'ul',
	'ol',
	'li',
	'blockquote',
	'h3',
	'h4',
	'hr',
	'br',
	'a',
	'table',
	'thead',
	'tbody',
	'tr',
	'th',
	'td'
] as const;

export type NoteTag = (typeof NOTE_TAGS)[number];
