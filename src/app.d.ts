declare global {
	namespace App {
		interface Error {
			message: string;
			/** Written in the log beside what really happened; shown to the person so that it can be quoted. */
			id?: string;
		}
	}
}

export {};
