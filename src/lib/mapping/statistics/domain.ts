/** The numbers a statistic is defined for; anything else is a mistake of the caller, never a result. */

/** @throws RangeError unless `value` is a whole number of at least 0 */
export function requireCount(name: string, value: number): void {
	if (!Number.isSafeInteger(value) || value < 0) {
		throw new RangeError(`${name} must be a whole number of at least 0, not ${value}`);
	}
}

/** @throws RangeError unless `value` lies in 0..1, both included */
export function requireProbability(name: string, value: number): void {
	if (!(value >= 0 && value <= 1)) throw new RangeError(`${name} must be a probability from 0 to 1, not ${value}`);
}
