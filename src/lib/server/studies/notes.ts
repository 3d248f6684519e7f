import MarkdownIt from 'markdown-it';
import { NOTE_TAGS, type NoteElement, type NoteNode, type NoteTag } from '../../schemas/note-node.ts';

/**
 * Notes in Markdown as a tree of known elements. HTML in them stays text, pictures are not drawn (they would be fetched from
 * elsewhere), and a link is one only to http, https, mailto or a place here.
 */

const markdown = new MarkdownIt({ html: false, linkify: false }).disable(['image']);
const SAFE = /^(https?:\/\/|mailto:|\/(?!\/))/i;
markdown.validateLink = (address) => SAFE.test(address.trim());

/** Headings of notes stand below those of the page. */
const HEADINGS: Record<string, NoteTag> = { h1: 'h3', h2: 'h3', h3: 'h4', h4: 'h4', h5: 'h4', h6: 'h4' };

const tagOf = (tag: string): NoteTag | undefined => HEADINGS[tag] ?? NOTE_TAGS.find((known) => known === tag);

type Token = ReturnType<typeof markdown.parse>[number];

export function notesTree(notes: string): NoteNode[] {
	const root: NoteNode[] = [];
	build(markdown.parse(notes, {}), root);
	return root;
}

function build(tokens: readonly Token[], into: NoteNode[]): void {
	const open: NoteNode[][] = [into];
	const here = () => open[open.length - 1];
	for (const token of tokens) {
		if (token.nesting === -1) {
			open.pop();
		} else if (token.nesting === 1) {
			const element = elementOf(token);
			here().push(element);
			open.push(element.children);
		} else if (token.type === 'inline') {
			build(token.children ?? [], here());
		} else {
			here().push(leafOf(token));
		}
	}
}

function elementOf(token: Token): NoteElement {
	const tag = tagOf(token.tag) ?? 'p';
	const href = tag === 'a' ? String(token.attrGet('href') ?? '') : '';
	return { tag, children: [], ...(SAFE.test(href) ? { href } : {}) };
}

function leafOf(token: Token): NoteNode {
	switch (token.type) {
		case 'code_inline':
			return { tag: 'code', children: [token.content] };
		case 'code_block':
		case 'fence':
			return { tag: 'pre', children: [token.content] };
		case 'hardbreak':
			return { tag: 'br', children: [] };
		case 'softbreak':
			return '\n';
		case 'hr':
			return { tag: 'hr', children: [] };
		default:
			return token.content;
	}
}
