import type { Written } from './letters.ts';

/** A mail as text and as HTML that says the same. */

export interface Rendered {
	subject: string;
	text: string;
	html: string;
}

const CLOSING = 'Hairsbreadth sent this mail by itself; answers to it are not read.';

export function render({ subject, paragraphs, link, after }: Written): Rendered {
	const closing = [...(after ? [after] : []), CLOSING];
	const text = [...paragraphs, ...(link ? [`${link.text}:\n${link.href}`] : []), ...closing].join('\n\n');
	const html = [
		'<!doctype html><html lang="en"><head><meta charset="utf-8">',
		`<title>${escapeHtml(subject)}</title></head>`,
		'<body style="font:15px/1.5 sans-serif;max-width:36em">',
		...paragraphs.map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
		...(link
			? [
					`<p><a href="${escapeHtml(link.href)}">${escapeHtml(link.text)}</a></p>`,
					`<p style="overflow-wrap:anywhere">${escapeHtml(link.href)}</p>`
				]
			: []),
		...closing.map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
		'</body></html>'
	].join('\n');
	return { subject: oneLine(subject), text: `${text}\n`, html };
}

/** A line end in a subject would begin a header of the sender's choice. */
function oneLine(text: string): string {
	return text.replace(/[\p{Cc}\u2028\u2029]+/gu, ' ');
}

function escapeHtml(text: string): string {
	return text
		.replaceAll('&', '&amp;')
		.replaceAll('<', '&lt;')
		.replaceAll('>', '&gt;')
		.replaceAll('"', '&quot;');
}
