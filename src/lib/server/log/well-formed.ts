/**
 * Finds what the shape of an entry lets through and its log must not hold: half of a surrogate pair, for which RFC 8785
 * (section 3.2.2.2) has no form, so that the entry could not be chained; and the one name that a check of fields skips.
 *
 * @returns what is wrong, naming the field, or null
 */
export function malformedIn(value: unknown, path: string[] = []): string | null {
	if (typeof value === 'string') {
		return value.isWellFormed() ? null : `${path.join('.')}: half of a character that needs two halves`;
	}
	if (typeof value !== 'object' || value === null) return null;
	for (const [name, inner] of Object.entries(value)) {
		if (name === '__proto__') return `${path.join('.')}: unknown field __proto__`;
		const fault = malformedIn(inner, [...path, name]);
		if (fault !== null) return fault;
	}
	return null;
}
