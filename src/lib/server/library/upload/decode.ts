import { refuse } from './refused-file.ts';

/** Largest text file that is read, in bytes. */
export const UPLOAD_BYTES_MAX = 5_000_000;

/** First bytes of what people upload by mistake. */
const DISGUISES: [string, number[]][] = [
	['a gzip archive', [0x1f, 0x8b]],
	['a zip archive or a spreadsheet', [0x50, 0x4b, 0x03, 0x04]],
	['a PDF', [0x25, 0x50, 0x44, 0x46]],
	['a PNG image', [0x89, 0x50, 0x4e, 0x47]],
	['a JPEG image', [0xff, 0xd8, 0xff]],
	['a GIF image', [0x47, 0x49, 0x46, 0x38]],
	['an old spreadsheet', [0xd0, 0xcf, 0x11, 0xe0]]
];

/** Text of an uploaded file with line ends made one kind. UTF-8 with or without mark, UTF-16 with a mark, else Latin-1. */
export function decode(bytes: Uint8Array): string {
	if (bytes.length === 0) refuse('empty', 'the file is empty');
	if (bytes.length > UPLOAD_BYTES_MAX)
		refuse('size', `the file has ${bytes.length} bytes; at most ${UPLOAD_BYTES_MAX} are read`);
	const disguise = DISGUISES.find(([, magic]) => magic.every((byte, index) => bytes[index] === byte));
	if (disguise) refuse('binary', `this is ${disguise[0]}, not a text file; export it as CSV or TSV`);
	const text = decodeText(bytes);
	if (/[^\P{Cc}\t\n\r\f]/u.test(text))
		refuse('binary', 'the file has control characters; it is not a text file');
	return text.replace(/\r\n?/g, '\n');
}

function decodeText(bytes: Uint8Array): string {
	if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
	if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes);
	try {
		return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
	} catch {
		// The web's "latin1" is windows-1252, which has a character for the bytes that Latin-1 leaves to controls.
		return new TextDecoder('windows-1252').decode(bytes);
	}
}
