import { createCipheriv, createDecipheriv, createHash, hkdfSync, randomBytes } from 'node:crypto';
import { authSettings } from './settings.ts';

/** Random texts that stand for a person, and the sealing of those that have to wait in a table. */

const SECRET_BYTES = 32;
const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** 256 random bits in 43 characters that are safe in an address and a cookie. */
export function newSecret(): string {
	return randomBytes(SECRET_BYTES).toString('base64url');
}

/**
 * What the database keeps of a secret. A plain SHA-256 is enough because the secret has 256 random bits: there is nothing
 * to guess, and a look-up by the hash tells nothing by its time.
 */
export function hashOf(secret: string): Buffer {
	return createHash('sha256').update(secret, 'utf8').digest();
}

/** A key of its own for each purpose, so that one leak does not open another door. */
export function keyFor(purpose: string): Buffer {
	return Buffer.from(hkdfSync('sha256', authSettings().secret, 'hairsbreadth', purpose, 32));
}

/** Encrypts what must wait in a table until it is sent. */
export function seal(text: string): string {
	const nonce = randomBytes(NONCE_BYTES);
	const cipher = createCipheriv('aes-256-gcm', keyFor('outbox'), nonce);
	const body = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()]);
	return Buffer.concat([nonce, cipher.getAuthTag(), body]).toString('base64');
}

/** @throws Error when the text was changed or sealed with another key */
export function unseal(sealed: string): string {
	const bytes = Buffer.from(sealed, 'base64');
	const decipher = createDecipheriv('aes-256-gcm', keyFor('outbox'), bytes.subarray(0, NONCE_BYTES));
	decipher.setAuthTag(bytes.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
	return Buffer.concat([decipher.update(bytes.subarray(NONCE_BYTES + TAG_BYTES)), decipher.final()]).toString(
		'utf8'
	);
}
