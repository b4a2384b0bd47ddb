/**
 * Spreadsheets run a cell that begins with one of these as a formula, whoever wrote it: OWASP ASVS 5.0, 1.2.10. An
 * apostrophe before it makes it text. One that stood there already gets another, so that the guard can be taken off
 * again without a doubt.
 */
const TO_GUARD = /^'*[=+\-@\t\r\0]/;
const GUARDED = /^'+[=+\-@\t\r\0]/;

export function guarded(text: string): string {
	return TO_GUARD.test(text) ? `'${text}` : text;
}

/** The text as it was before `guarded`. */
export function unguarded(text: string): string {
	return GUARDED.test(text) ? text.slice(1) : text;
}
