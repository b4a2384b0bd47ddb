import { describe, expect, test } from 'vitest';
import { LOST_AFTER, patientStatus } from '$lib/live/patient-status';
import type { PatientPresence } from '$lib/stimuli/display';
import type { Heard } from '$lib/stimuli/presence';

const FINE: PatientPresence = {
	visible: true,
	fullScreen: true,
	unlocked: true,
	wakeLock: true,
	ready: 3,
	total: 3,
	frameAge: 16,
	calibrated: true
};

type Word = Parameters<typeof patientStatus>[1];
const direct = (age: number, presence: Partial<PatientPresence> = {}): Word => ({
	age,
	presence: { ...FINE, ...presence }
});
const passed = (age: number, presence: Partial<PatientPresence> = {}, connected = true) => ({
	age,
	heard: { kind: 'patient', view: 'a', connected, heardAt: 0, ...FINE, ...presence } as Heard & { kind: 'patient' }
});
const is = (...words: Parameters<typeof patientStatus>) => patientStatus(...words).is;

describe('how the patient view stands', () => {
	test('is said of what matters most: out of sight, then locked, then not whole, then loading', () => {
		const faults: [string, Partial<PatientPresence>][] = [
			['hidden', { visible: false }],
			['locked', { unlocked: false }],
			['not-full-screen', { fullScreen: false }],
			['loading', { ready: 2 }]
		];
		for (const [index, [word]] of faults.entries()) {
			const all = Object.assign({}, ...faults.slice(index).map(([, fault]) => fault)) as Partial<PatientPresence>;
			expect(is(true, direct(0, all), null)).toBe(word);
			expect(is(true, null, passed(0, all))).toBe(word);
		}
		expect(is(true, direct(0), null)).toBe('on-screen');
	});

	test('a page that speaks but draws no frames is out of sight', () => {
		expect(is(true, direct(0, { frameAge: LOST_AFTER }), null)).toBe('on-screen');
		expect(is(true, direct(0, { frameAge: LOST_AFTER + 1 }), null)).toBe('hidden');
	});

	test('is lost when neither way was heard for 2 s, and not paired before that', () => {
		expect(LOST_AFTER).toBe(2000);
		expect(is(true, null, null)).toBe('lost');
		expect(is(true, direct(1999), null)).toBe('on-screen');
		expect(is(true, direct(2000), passed(2000))).toBe('lost');
		expect(is(true, direct(5000), passed(1000))).toBe('on-screen');
		expect(is(false, direct(0), passed(0))).toBe('not-paired');
	});

	test('the freshest word of the two ways holds', () => {
		expect(is(true, direct(100, { visible: false }), passed(900))).toBe('hidden');
		expect(is(true, direct(900, { visible: false }), passed(100))).toBe('on-screen');
	});

	test('a view whose line to the server ended is lost, unless the other window speaks after that', () => {
		expect(is(true, null, passed(0, {}, false))).toBe('lost');
		expect(is(true, direct(500), passed(100, {}, false))).toBe('lost');
		expect(is(true, direct(100), passed(500, {}, false))).toBe('on-screen');
	});
});
