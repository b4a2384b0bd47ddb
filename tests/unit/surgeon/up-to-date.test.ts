import { describe, expect, it } from 'vitest';
import { outOfDate, type DeviceWord, type Hearsay } from '../../../src/lib/components/surgeon/up-to-date';
import { notUpToDate } from '../../../src/lib/messages/surgeon';

const device = (said: Partial<DeviceWord> = {}): DeviceWord => ({
	device: 'examiner',
	age: 400,
	waiting: 0,
	oldest: 0,
	...said
});
const heard = (said: Partial<Hearsay> = {}): Hearsay => ({ serverAge: 500, runs: [], devices: [], ...said });
const run = (lead: string | null, knownFor = 60_000) => ({ run: { lead }, knownFor });

describe('whether the screen is up to date', () => {
	it('is, with a server heard, no run open and nobody waiting, whoever is silent', () => {
		expect(outOfDate(heard({ devices: [device({ age: 600_000 })] }))).toBeNull();
	});

	it('is not once the server is unheard for more than 3 s', () => {
		expect(outOfDate(heard({ serverAge: 3000 }))).toBeNull();
		expect(outOfDate(heard({ serverAge: 3001 }))).toEqual({ why: 'server', age: 3001 });
	});

	it('is not once the lead of an open run is unheard for more than 3 s', () => {
		expect(outOfDate(heard({ runs: [run('examiner')], devices: [device({ age: 2900 })] }))).toBeNull();
		expect(outOfDate(heard({ runs: [run('examiner')], devices: [device({ age: 3100 })] }))).toEqual({
			why: 'examiner',
			age: 3100
		});
	});

	it('is not when the lead was never heard, counted from when the run was known', () => {
		expect(outOfDate(heard({ runs: [run('examiner', 2000)], devices: [device({ device: 'other' })] }))).toBeNull();
		expect(outOfDate(heard({ runs: [run('examiner', 5000)], devices: [device({ device: 'other' })] }))).toEqual({
			why: 'examiner',
			age: 5000
		});
	});

	it('does not wait for anybody in a run without a lead', () => {
		expect(outOfDate(heard({ runs: [run(null)] }))).toBeNull();
	});

	it('is not when entries wait longer than a second, and one that only passes is nothing', () => {
		expect(outOfDate(heard({ devices: [device({ waiting: 1, oldest: 300 })] }))).toBeNull();
		expect(outOfDate(heard({ devices: [device({ waiting: 2, oldest: 1500 })] }))).toEqual({
			why: 'waiting',
			age: 1900
		});
	});

	it('is not when a device fell silent with an entry in hand', () => {
		expect(outOfDate(heard({ devices: [device({ waiting: 1, oldest: 300, age: 3000 })] }))).toEqual({
			why: 'waiting',
			age: 3300
		});
	});

	it('names the nearest cause and counts from the oldest', () => {
		expect(
			outOfDate(
				heard({ serverAge: 4000, runs: [run('examiner')], devices: [device({ age: 9000, waiting: 1, oldest: 2000 })] })
			)
		).toEqual({ why: 'server', age: 11_000 });
	});

	it("says since when in the clinic's zone", () => {
		expect(notUpToDate('server', Date.parse('2026-12-01T23:05:09Z'), 'Asia/Tokyo')).toEqual([
			'Not up to date since 08:05:09',
			'server not heard'
		]);
	});
});
