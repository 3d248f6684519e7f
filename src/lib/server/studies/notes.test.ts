import { describe, expect, it } from 'vitest';
import { NOTE_TAGS, type NoteNode } from '../../schemas/note-node.ts';
import { notesTree } from './notes.ts';

const element = (tag: string, ...children: unknown[]) => ({ tag, children });

/** Everything in the tree, elements before what is in them. */
const everything = (nodes: NoteNode[]): NoteNode[] =>
	nodes.flatMap((node) => (typeof node === 'string' ? [node] : [node, ...everything(node.children)]));

describe('notesTree', () => {
	it('sets Markdown', () => {
		expect(notesTree('**bold** and `code`\n\n- one\n- two')).toEqual([
			element('p', '', element('strong', 'bold'), ' and ', element('code', 'code')),
			element('ul', element('li', element('p', 'one')), element('li', element('p', 'two')))
		]);
		expect(notesTree('# Head\nline  \nbreak')).toEqual([
			element('h3', 'Head'),
			element('p', 'line', element('br'), 'break')
		]);
		expect(everything(notesTree('[page](https://example.org)'))).toContainEqual({
			tag: 'a',
			href: 'https://example.org',
			children: ['page']
		});
	});

	it.each([
		'<script>alert(1)</script>',
		'<img src=x onerror=alert(1)>',
		'[x](javascript:alert(1))',
		'[x](JaVaScRiPt:alert(1))',
		'[x](data:text/html;base64,PHNjcmlwdD4=)',
		'[x](//example.org)',
		'![x](https://example.org/x.png)',
		'<a href="javascript:alert(1)">x</a>',
		'[x]: javascript:alert(1)\n\n[x]'
	])('makes no link and no foreign element of %s', (text) => {
		const nodes = everything(notesTree(text));
		expect(nodes.length).toBeGreaterThan(0);
		for (const node of nodes) {
			if (typeof node === 'string') continue;
			expect(NOTE_TAGS).toContain(node.tag);
			expect(node.href ?? 'https://').toMatch(/^(https?:\/\/|mailto:|\/[^/])/);
		}
		expect(
			nodes.some((node) => typeof node !== 'string' && /^(javascript|data|\/\/)/i.test(node.href ?? ''))
		).toBe(false);
	});
});
