/** Answers that are decided by the request's form or by how busy the server is, not by the rules of a service. */

export class BadRequest extends Error {
	override readonly name = 'BadRequest';

	constructor(
		readonly status: 400 | 403 | 405 | 413 | 415,
		readonly code: string,
		message: string
	) {
		super(message);
	}
}

/** It cannot be done now; the same request may succeed later. */
export class Unavailable extends Error {
	override readonly name = 'Unavailable';

	constructor(
		readonly code: string,
		message: string,
		readonly retryAfterSeconds?: number
	) {
		super(message);
	}
}

/** Whoever asked has gone away; nobody reads the answer. */
export class Cancelled extends Error {
	override readonly name = 'Cancelled';

	constructor() {
		super('The caller has gone away.');
	}
}
