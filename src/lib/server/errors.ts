/** What services throw; routes and the API turn each into an answer. The message says what to do next. */

export interface Issue {
	/** The field, as `arrangement.left.layers[0].thicknessNm`. */
	path: string;
	/** What is wrong and what would be right. */
	message: string;
}

export class NotFound extends Error {
	override readonly name = 'NotFound';
}

export class Forbidden extends Error {
	override readonly name = 'Forbidden';
}

/** Told wherever role or scope do not reach. */
export const FORBIDDEN = 'Your role, or the scope of the token, does not allow this. Ask an administrator.';

export class Conflict extends Error {
	override readonly name = 'Conflict';
}

/** A step that the state of the thing does not allow. */
export class StateError extends Error {
	override readonly name = 'StateError';
}

export class InvalidInput extends Error {
	override readonly name = 'InvalidInput';

	constructor(
		message: string,
		readonly issues: Issue[],
		readonly code = 'invalid'
	) {
		super(message);
	}
}

export class TooManyRequests extends Error {
	override readonly name = 'TooManyRequests';

	constructor(
		message: string,
		readonly retryAfterSeconds: number
	) {
		super(message);
	}
}
