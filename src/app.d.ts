import type { AccountSummary } from '$lib/schemas/person.ts';
import type { Principal } from '$lib/server/auth/principal.ts';

declare global {
	namespace App {
		interface Error {
			message: string;
			/** Written in the log beside what really happened; shown to the person so that it can be quoted. */
			id?: string;
		}

		interface PageData {
			/** Who is signed in, for the header and the units that pages begin with. */
			account?: AccountSummary | null;
		}

		interface Locals {
			/** Who asks; decided by the hook before any route runs. */
			principal: Principal;
			/** The page is of something that was withdrawn. */
			gone?: boolean;
		}
	}
}

export {};
