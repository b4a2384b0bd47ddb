/** Numbers and times as they stand on screen. Times are shown in the clinic's zone, never the browser's. */

const oneDecimal = new Intl.NumberFormat('en', { minimumFractionDigits: 1, maximumFractionDigits: 1 });
const upToTwoDecimals = new Intl.NumberFormat('en', { minimumFractionDigits: 1, maximumFractionDigits: 2 });

/** A current, zero to peak: "3.0 mA". */
export function milliamps(value: number): string {
	return `${upToTwoDecimals.format(value)} mA`;
}

/** A share between 0 and 1: "2.6 %". */
export function percent(share: number): string {
	return `${oneDecimal.format(share * 100)} %`;
}

/** A point in time, by day and minute: "2026-05-04 09:31". */
export function dateTime(instant: string | number, zone: string): string {
	return formatter(zone, { dateStyle: 'short', timeStyle: 'short' }).format(new Date(instant));
}

/** The time of day to the second: "09:31:07". */
export function timeOfDay(instant: string | number, zone: string): string {
	return formatter(zone, { timeStyle: 'medium' }).format(new Date(instant));
}

/** Minutes and seconds since something: "0:09". */
export function elapsed(milliseconds: number): string {
	const seconds = Math.max(0, Math.floor(milliseconds / 1000));
	return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`;
}

const formatters = new Map<string, Intl.DateTimeFormat>();

/** Swedish writes dates as ISO 8601 does. */
function formatter(zone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
	const key = `${zone} ${JSON.stringify(options)}`;
	const known = formatters.get(key) ?? new Intl.DateTimeFormat('sv', { ...options, timeZone: zone });
	formatters.set(key, known);
	return known;
}
