import { REFUSALS } from '$lib/messages/refusals';
import { refusal } from '../answer';

/** A position given as text; none is 0, before the first entry. */
export function positionOf(text: string | null): { ok: true; position: number } | { ok: false; response: Response } {
	const position = Number(text ?? 0);
	if (/^\d*$/.test(text ?? '') && Number.isSafeInteger(position)) return { ok: true, position };
	return { ok: false, response: refusal(422, REFUSALS.position) };
}
