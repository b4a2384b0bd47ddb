import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { zonedTime } from '../../../src/lib/server/exports/zoned-time';

// Offsets and the hours of change: IANA time zone database, files europe, asia and northamerica.
describe('a time in the zone of a clinic', () => {
	it('carries the offset that held there then', () => {
		expect(zonedTime('2026-01-15T08:31:07.250Z', 'Europe/Berlin')).toBe('2026-01-15T09:31:07.250+01:00');
		expect(zonedTime('2026-07-15T08:31:07.25Z', 'Europe/Berlin')).toBe('2026-07-15T10:31:07.250+02:00');
		expect(zonedTime('2026-07-15T23:31:07+02:00', 'Asia/Kathmandu')).toBe('2026-07-16T03:16:07.000+05:45');
		expect(zonedTime('2026-01-01T00:00:00Z', 'America/St_Johns')).toBe('2025-12-31T20:30:00.000-03:30');
		expect(zonedTime('2026-01-15T00:00:00Z', 'UTC')).toBe('2026-01-15T00:00:00.000+00:00');
	});

	it('tells the two hours of the night apart in which clocks are set back', () => {
		expect(zonedTime('2026-10-25T00:30:00Z', 'Europe/Berlin')).toBe('2026-10-25T02:30:00.000+02:00');
		expect(zonedTime('2026-10-25T01:30:00Z', 'Europe/Berlin')).toBe('2026-10-25T02:30:00.000+01:00');
	});

	it('is in UTC where the offset had seconds', () => {
		expect(zonedTime('1971-06-01T00:00:00Z', 'Africa/Monrovia')).toBe('1971-06-01T00:00:00.000Z');
	});

	it('is the same point in time in every zone', () => {
		const instants = fc.date({ min: new Date(0), max: new Date('2100-01-01'), noInvalidDate: true });
		const zones = fc.constantFrom('Europe/Berlin', 'America/New_York', 'Asia/Kolkata', 'Pacific/Chatham', 'UTC');
		fc.assert(
			fc.property(instants, zones, (instant, zone) => {
				expect(Date.parse(zonedTime(instant.toISOString(), zone))).toBe(instant.getTime());
			})
		);
	});
});
