import { createHash, randomBytes, randomInt, randomUUID } from 'node:crypto';
import { normalCode } from '$lib/stimuli/pairing-code';
import { db } from '../database';
import type { PatientViewRow } from '../tables';

/** A screen for the patient, from the code that was offered for it to its end. */
export interface PatientView {
	id: string;
	case: string;
	state: PatientViewRow['state'];
	/** shown on both screens, so that the examiner confirms the right device */
	checkWord: string | null;
}

/** A code works once, within ten minutes. */
export const CODE_MINUTES = 10;

/** Crockford's base 32: no letters that are read as digits. Eight of them are 40 bits. */
const LETTERS = '0123456789ABCDEFGHJKMNPQRSTVWXYZ';

function newCode(): string {
	const letters = Array.from({ length: 8 }, () => LETTERS.charAt(randomInt(32))).join('');
	return `${letters.slice(0, 4)}-${letters.slice(4)}`;
}

function sha256(text: string): string {
	return createHash('sha256').update(text).digest('hex');
}

function toView(row: PatientViewRow): PatientView {
	return { id: row.id, case: row.case_code, state: row.state, checkWord: row.check_word };
}

const open = (code: string) =>
	db<PatientViewRow>('patient_views').where({ case_code: code }).whereIn('state', ['offered', 'claimed']);

/** Offers a code for a case; an older offer of the case ends. */
export async function offerPatientView(
	code: string,
	by: string
): Promise<{ view: PatientView; pairingCode: string; expiresAt: string }> {
	const pairingCode = newCode();
	const expiresAt = new Date(Date.now() + CODE_MINUTES * 60_000).toISOString();
	const row: PatientViewRow = {
		id: randomUUID(),
		case_code: code,
		state: 'offered',
		code_hash: sha256(normalCode(pairingCode)),
		token_hash: null,
		check_word: null,
		created_by: by,
		created_at: new Date().toISOString(),
		expires_at: expiresAt
	};
	await open(code).update({ state: 'ended' });
	await db<PatientViewRow>('patient_views').insert(row);
	return { view: toView(row), pairingCode, expiresAt };
}

/**
 * A device gives the code: it gets a token of its own, and waits for the examiner's word.
 *
 * @returns null for a code that is wrong, used or too old
 */
export async function claimPatientView(pairingCode: string): Promise<{ view: PatientView; token: string } | null> {
	const token = randomBytes(32).toString('base64url');
	const [row] = await db<PatientViewRow>('patient_views')
		.where({ code_hash: sha256(normalCode(pairingCode)), state: 'offered' })
		.where('expires_at', '>', new Date().toISOString())
		.update({ state: 'claimed', token_hash: sha256(token), check_word: newCheckWord() })
		.returning('*');
	return row ? { view: toView(row), token } : null;
}

function newCheckWord(): string {
	return String(randomInt(100)).padStart(2, '0');
}

/**
 * The examiner says that the device that waits is the right one; the view the case had before ends.
 *
 * @returns null when that view does not wait any more
 */
export async function confirmPatientView(
	code: string,
	id: string
): Promise<{ view: PatientView; replaced: PatientView[] } | null> {
	return await db.transaction(async (trx) => {
		const [row] = await trx<PatientViewRow>('patient_views')
			.where({ id, case_code: code, state: 'claimed' })
			.update({ state: 'confirmed' })
			.returning('*');
		if (!row) return null;
		const replaced = await trx<PatientViewRow>('patient_views')
			.where({ case_code: code, state: 'confirmed' })
			.whereNot({ id })
			.update({ state: 'ended' })
			.returning('*');
		return { view: toView(row), replaced: replaced.map(toView) };
	});
}

/** Ends every view and offer of a case. */
export async function endPatientViews(code: string): Promise<PatientView[]> {
	const ended = await db<PatientViewRow>('patient_views')
		.where({ case_code: code })
		.whereNot({ state: 'ended' })
		.update({ state: 'ended' })
		.returning('*');
	return ended.map(toView);
}

/** The view that is active, and the one that waits for a device or for the examiner's word. */
export async function patientViewsOf(
	code: string
): Promise<{ active: PatientView | null; waiting: PatientView | null }> {
	const rows = await db<PatientViewRow>('patient_views').where({ case_code: code }).whereNot({ state: 'ended' });
	const now = new Date().toISOString();
	const active = rows.find((row) => row.state === 'confirmed');
	const waiting = rows.find((row) => row.state === 'claimed' || (row.state === 'offered' && row.expires_at > now));
	return { active: active ? toView(active) : null, waiting: waiting ? toView(waiting) : null };
}

/** The view whose device has this token, while it has not ended. */
export async function patientViewByToken(token: string): Promise<PatientView | null> {
	const row = await db<PatientViewRow>('patient_views')
		.where({ token_hash: sha256(token) })
		.whereNot({ state: 'ended' })
		.first();
	return row ? toView(row) : null;
}
