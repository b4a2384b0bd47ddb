/**
 * A point in time as RFC 3339 with the offset that holds in a zone then: "2026-05-04T09:31:07.250+02:00". In UTC where
 * the zone's offset had seconds in it, which RFC 3339 cannot write.
 *
 * @param instant RFC 3339
 * @param zone name in the IANA time zone database
 */
export function zonedTime(instant: string, zone: string): string {
	const date = new Date(instant);
	const parts = new Map(
		formatter(zone)
			.formatToParts(date)
			.map(({ type, value }) => [type, value])
	);
	const part = (type: Intl.DateTimeFormatPartTypes) => parts.get(type) ?? '';
	const offset = /^GMT([+-]\d\d:\d\d)?$/.exec(part('timeZoneName'));
	if (!offset) return date.toISOString();
	const day = `${part('year').padStart(4, '0')}-${part('month')}-${part('day')}`;
	const time = `${part('hour')}:${part('minute')}:${part('second')}.${part('fractionalSecond')}`;
	return `${day}T${time}${offset[1] ?? '+00:00'}`;
}

const formatters = new Map<string, Intl.DateTimeFormat>();

function formatter(zone: string): Intl.DateTimeFormat {
	const known =
		formatters.get(zone) ??
		new Intl.DateTimeFormat('en', {
			timeZone: zone,
			calendar: 'iso8601',
			numberingSystem: 'latn',
			hourCycle: 'h23',
			year: 'numeric',
			month: '2-digit',
			day: '2-digit',
			hour: '2-digit',
			minute: '2-digit',
			second: '2-digit',
			fractionalSecondDigits: 3,
			timeZoneName: 'longOffset'
		});
	formatters.set(zone, known);
	return known;
}
