import { describe, expect, it } from 'vitest';
import { level, LEVEL, rootMeanSquare, trimSilence } from '../../../src/lib/server/media/level-sound';
import { decodeWav, encodeWav } from '../../../src/lib/server/media/wav';

const sampleRate = 16000;
const tone = (seconds: number, amplitude: number) =>
	Float32Array.from(
		{ length: seconds * sampleRate },
		(_, at) => amplitude * Math.sin((2 * Math.PI * 440 * at) / sampleRate)
	);
const silence = (seconds: number) => new Float32Array(seconds * sampleRate);
const joined = (...parts: Float32Array[]) => ({
	samples: Float32Array.from(parts.flatMap((part) => [...part])),
	sampleRate
});

describe('trimSilence', () => {
	it('leaves 20 ms before the sound and 60 ms after it', () => {
		const trimmed = trimSilence(joined(silence(0.5), tone(0.4, 0.5), silence(0.7)));
		expect(trimmed.samples.length / sampleRate).toBeCloseTo(0.48, 2);
		const first = trimmed.samples.findIndex((sample) => Math.abs(sample) > 0.01);
		expect(first / sampleRate).toBeGreaterThan(0.015);
		expect(first / sampleRate).toBeLessThan(0.03);
	});

	it('keeps a weak beginning and a pause inside', () => {
		// 30 dB below the loudest, as an f before a vowel.
		const trimmed = trimSilence(joined(silence(0.3), tone(0.1, 0.016), tone(0.2, 0.5), silence(0.2), tone(0.1, 0.5)));
		expect(trimmed.samples.length / sampleRate).toBeCloseTo(0.62, 2);
	});

	it('begins and ends without a click', () => {
		const { samples } = trimSilence(joined(tone(0.2, 0.5)));
		expect([samples[0], samples.at(-1)].map((sample) => Math.abs(sample ?? 1))).toEqual([0, 0]);
	});

	it('refuses silence', () => {
		expect(() => trimSilence(joined(silence(0.2)))).toThrow('nothing but silence');
	});
});

describe('level', () => {
	it('brings loud and soft to one level', () => {
		expect(rootMeanSquare(level(joined(tone(0.3, 0.9))).samples)).toBeCloseTo(LEVEL, 4);
		expect(rootMeanSquare(level(joined(tone(0.3, 0.003))).samples)).toBeCloseTo(LEVEL, 4);
	});

	it('refuses to clip', () => {
		expect(() => level(joined(tone(0.01, 0.9), silence(2)))).toThrow(/its peak would be 1\.\d\d of full scale/);
	});
});

describe('a WAV file', () => {
	it('gives back the samples within half a step of 16 bits', () => {
		const sound = joined(tone(0.05, 0.7));
		const read = decodeWav(encodeWav(sound));
		expect(read.sampleRate).toBe(sampleRate);
		expect(read.samples.length).toBe(sound.samples.length);
		const worst = sound.samples.reduce(
			(most, sample, at) => Math.max(most, Math.abs(sample - (read.samples[at] ?? 9))),
			0
		);
		expect(worst).toBeLessThan(1 / 32767);
	});

	it('is refused when it is none, or has two channels', () => {
		expect(() => decodeWav(Buffer.alloc(60))).toThrow('not a RIFF WAVE file');
		const stereo = encodeWav(joined(tone(0.01, 0.5)));
		stereo.writeUInt16LE(2, 22);
		expect(() => decodeWav(stereo)).toThrow('not 16-bit PCM of one channel');
	});
});
