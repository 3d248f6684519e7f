import PDFDocument from 'pdfkit';
import svgToPdf from 'svg-to-pdfkit';
import regular from '@fontsource/commit-mono/files/commit-mono-latin-400-normal.woff?inline';
import { sheetSvg, type Sheet } from '../../study-sheet/sheet.ts';

/** One page of A4: title, the stack as vectors, the title block in a frame at the foot. */

const A4 = { width: 595.28, height: 841.89 };
const MARGIN = 45;
const WIDTH = A4.width - 2 * MARGIN;
/** Of the picture, which is 672 px wide. */
const SCALE = WIDTH / 672;
const PAD = 7;
/** Points; the block is set in the largest of these that leaves it on the page. */
const SIZES = [8, 7.5, 7, 6.5, 6, 5.5, 5, 4.5, 4];

const fontOf = (address: string) => Buffer.from(address.slice(address.indexOf(',') + 1), 'base64');

/** The standard font of the picture has no minus sign and no letters outside Western Europe. */
const westernOnly = (svg: string) => svg.replaceAll('\u2212', '\u2013').replace(/[^\n -\u00ff\u2013]/g, '?');

/** @param made  ISO time, in UTC, written into the file so that the same sheet gives the same bytes */
export async function sheetPdf(sheet: Sheet, made: string): Promise<Buffer> {
	const document = new PDFDocument({
		size: 'A4',
		margin: MARGIN,
		info: { Title: sheet.title, Creator: 'Hairsbreadth', CreationDate: new Date(made) }
	});
	const pieces: Buffer[] = [];
	document.on('data', (piece: Buffer) => pieces.push(piece));
	const ended = new Promise<void>((fulfil, reject) => {
		document.on('end', fulfil);
		document.on('error', reject);
	});
	document.registerFont('text', fontOf(regular));

	const white: Sheet = {
		...sheet,
		title: '',
		block: [],
		colour: (token) => (token === 'page' ? '#ffffff' : sheet.colour(token))
	};
	document.font('text').fontSize(13).text(sheet.title, MARGIN, MARGIN, { width: WIDTH });
	const pictureTop = document.y - 20;
	const picture = sheetSvg(white);
	const pictureHeight = Number(/height="([\d.]+)"/.exec(picture)?.[1]) * SCALE;
	svgToPdf(document, westernOnly(picture), MARGIN, pictureTop, {
		width: WIDTH,
		height: pictureHeight,
		preserveAspectRatio: 'xMinYMin',
		fontCallback: (_family: string, isBold: boolean) => (isBold ? 'Helvetica-Bold' : 'Helvetica')
	});

	const top = pictureTop + pictureHeight + 14;
	const room = A4.height - MARGIN - top;
	const text = sheet.block.join('\n');
	const setting = { width: WIDTH - 2 * PAD, lineGap: 1.5 };
	const size =
		SIZES.find(
			(candidate) => document.font('text').fontSize(candidate).heightOfString(text, setting) + 2 * PAD < room
		) ?? SIZES[SIZES.length - 1];
	document.font('text').fontSize(size);
	const height = Math.min(room, document.heightOfString(text, setting) + 2 * PAD);
	document.rect(MARGIN, top, WIDTH, height).lineWidth(0.8).stroke('#000000');
	document
		.fillColor('#000000')
		.text(text, MARGIN + PAD, top + PAD, { ...setting, height: height - PAD, ellipsis: true });
	document.end();
	await ended;
	return Buffer.concat(pieces);
}
