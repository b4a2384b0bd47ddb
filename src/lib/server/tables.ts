/** The rows as SQLite holds them; each module maps its own to what the rest of the program uses. */

export interface AccountRow {
	id: string;
	email: string;
	name: string;
	/** JSON list */
	roles: string;
	password_hash: string | null;
	created_at: string;
	disabled_at: string | null;
}

export interface SessionRow {
	id: string;
	account_id: string;
	/** seconds since the epoch */
	expires_at: number;
}

export interface InvitationRow {
	token_hash: string;
	account_id: string | null;
	created_at: string;
	expires_at: string;
	used_at: string | null;
}

export interface CaseRow {
	code: string;
	hemisphere: string;
	/** JSON list of BCP 47 tags */
	languages: string;
	planned_on: string | null;
	note: string;
	created_at: string;
	created_by: string;
}

export interface CaseLogRow {
	case_code: string;
	position: number;
	id: string;
	received_at: string;
	sender: string;
	/** JSON as it came */
	event: string;
	hash: string;
}

export interface PatientViewRow {
	id: string;
	case_code: string;
	state: 'offered' | 'claimed' | 'confirmed' | 'ended';
	code_hash: string;
	token_hash: string | null;
	check_word: string | null;
	created_by: string;
	created_at: string;
	expires_at: string;
}
