/**
 * The stack as one picture to take away: SVG whose text stays text, with the values of the tokens in place of their names
 * and nothing that points outside.
 */

const KEPT = [
	'fill',
	'stroke',
	'stroke-width',
	'stroke-dasharray',
	'paint-order',
	'font-family',
	'font-size',
	'font-weight',
	'font-style',
	'font-stretch',
	'text-anchor'
];

const MARGIN = 16;
const HEAD = 34;
const LINE = 16;
/** For printed columns: twice the pixels of the screen. */
const PNG_SCALE = 2;

const escaped = (text: string) =>
	text.replace(/[&<>"]/g, (sign) => `&#${sign.charCodeAt(0)};`).replace(/\s+/g, ' ');

function dressed(original: Element): Element {
	const copy = original.cloneNode(false) as Element;
	const style = getComputedStyle(original);
	for (const name of ['class', ...KEPT]) copy.removeAttribute(name);
	copy.setAttribute('style', KEPT.map((name) => `${name}:${style.getPropertyValue(name)}`).join(';'));
	for (const child of original.childNodes) {
		copy.append(child instanceof Element ? dressed(child) : child.cloneNode());
	}
	return copy;
}

export interface Picture {
	svg: string;
	width: number;
	height: number;
}

/** @param origin lines of the block below: what is drawn, from which versions, where it is found */
export function stackPicture(stack: HTMLElement, title: string, origin: readonly string[]): Picture {
	const frame = stack.getBoundingClientRect();
	const page = getComputedStyle(document.documentElement);
	const token = (name: string) => page.getPropertyValue(`--${name}`).trim();
	const width = Math.ceil(frame.width) + 2 * MARGIN;
	const blockTop = HEAD + frame.height + 12;
	const height = Math.ceil(blockTop + LINE * origin.length + 14 + MARGIN);

	const text = (x: number, y: number, content: string, look: string) =>
		`<text x="${x}" y="${y.toFixed(1)}" fill="${token('ink')}" style="font-family:'Archivo Variable',Archivo,sans-serif;${look}">${escaped(content)}</text>`;
	const inside = (element: Element) => {
		const box = element.getBoundingClientRect();
		return { x: MARGIN + box.left - frame.left, y: HEAD + box.top - frame.top, height: box.height };
	};

	const strips = [...stack.querySelectorAll(':scope > svg')].map((strip) => {
		const { x, y } = inside(strip);
		const copy = dressed(strip);
		copy.setAttribute('x', String(x));
		copy.setAttribute('y', y.toFixed(1));
		return new XMLSerializer().serializeToString(copy);
	});
	const captions = [...stack.querySelectorAll(':scope > p')].map((caption) => {
		const { x, y, height: tall } = inside(caption);
		return text(x, y + 0.75 * tall, caption.textContent ?? '', 'font-size:13px;font-weight:620');
	});
	const hairline = [...stack.querySelectorAll('[data-hairline]')].map((line) => {
		const { x } = inside(line);
		return `<path d="M${x.toFixed(1)} ${HEAD}V${(HEAD + frame.height).toFixed(1)}" stroke="${token('hairline')}" stroke-width="1.25"/>`;
	});

	const svg = [
		`<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}">`,
		`<title>${escaped(title)}</title><desc>${escaped(origin.join('; '))}</desc>`,
		`<rect width="${width}" height="${height}" fill="${token('page')}"/>`,
		text(MARGIN, 23, title, 'font-size:18px;font-weight:620'),
		...hairline,
		...strips,
		...captions,
		`<rect x="${MARGIN}.5" y="${blockTop.toFixed(1)}" width="${width - 2 * MARGIN - 1}" height="${LINE * origin.length + 12}" fill="none" stroke="${token('ink')}"/>`,
		...origin.map((line, index) => text(MARGIN + 9, blockTop + 18 + LINE * index, line, 'font-size:12px')),
		'</svg>'
	].join('');
	return { svg, width, height };
}

/** The same picture in pixels. */
export async function pictureAsPng({ svg, width, height }: Picture): Promise<Blob> {
	const address = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }));
	try {
		const image = new Image();
		image.src = address;
		await image.decode();
		const canvas = document.createElement('canvas');
		canvas.width = width * PNG_SCALE;
		canvas.height = height * PNG_SCALE;
		canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
		return await new Promise((resolve, reject) =>
			canvas.toBlob((blob) => (blob === null ? reject(new Error('no picture')) : resolve(blob)), 'image/png')
		);
	} finally {
		URL.revokeObjectURL(address);
	}
}
