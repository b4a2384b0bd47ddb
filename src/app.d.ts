import type { Account } from '$lib/server/accounts/accounts';
import type { Case } from '$lib/server/cases/cases';
import type { PatientView } from '$lib/server/live/patient-views';

declare global {
	namespace App {
		interface Error {
			message: string;
			/** names this failure in the server's log */
			id?: string;
		}
		interface Locals {
			/** who is signed in */
			account: Account | null;
			session: string | null;
			/** the paired patient view; set on its own routes only */
			patientView: PatientView | null;
			/** the case a route is about, once `hooks.server.ts` has let the request through */
			case: Case;
		}
	}
}

export {};
