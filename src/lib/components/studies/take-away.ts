/** What the browser does with a file or a picture that leaves the page. */

/** Colours of the light page, read from the style sheet itself: a picture for paper is light whatever the screen is. */
export function lightTokens(
	sheets: Iterable<CSSStyleSheet> = document.styleSheets
): (token: string) => string {
	const found = new Map<string, string>();
	const read = (rules: CSSRuleList) => {
		for (const rule of rules) {
			if (rule instanceof CSSMediaRule) continue;
			if (rule instanceof CSSStyleRule && rule.selectorText.includes(':root')) {
				for (const name of rule.style)
					if (name.startsWith('--')) found.set(name.slice(2), rule.style.getPropertyValue(name).trim());
			} else if ('cssRules' in rule && rule.cssRules instanceof CSSRuleList) read(rule.cssRules);
		}
	};
	for (const sheet of sheets) read(sheet.cssRules);
	return (token) => found.get(token) ?? 'currentColor';
}

export function download(name: string, content: Blob): void {
	const address = URL.createObjectURL(content);
	const link = document.createElement('a');
	link.href = address;
	link.download = name;
	link.click();
	// The download has begun by the next turn of the event loop, not necessarily before.
	setTimeout(() => URL.revokeObjectURL(address), 10_000);
}

/** Draws an SVG text at twice its size. */
export async function pngOf(svg: string): Promise<Blob> {
	const address = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }));
	try {
		const picture = new Image();
		picture.src = address;
		await picture.decode();
		const canvas = document.createElement('canvas');
		canvas.width = picture.naturalWidth * 2;
		canvas.height = picture.naturalHeight * 2;
		canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height);
		return await new Promise<Blob>((resolve, reject) => {
			canvas.toBlob(
				(blob) => (blob ? resolve(blob) : reject(new Error('the picture could not be drawn'))),
				'image/png'
			);
		});
	} finally {
		URL.revokeObjectURL(address);
	}
}

/** "Gold against silica, in bromobenzene" as the name of a file. */
export const fileName = (title: string): string =>
	title
		.toLowerCase()
		.replace(/[^a-z0-9]+/g, '-')
		.replace(/^-|-$/g, '')
		.slice(0, 80);
