import type { Sound } from './wav';

/** Root mean square of every finished sound, full scale = 1 (-20 dB): loud, and with room for the peaks of speech. */
export const LEVEL = 0.1;

const FRAME = 0.005;
/**
 * A frame belongs to the speech when it is within 35 dB of the loudest: the voice's f and th (-30 dB) stay, the noise it
 * makes before a p or c (-40 dB) goes.
 */
const SILENCE = 0.0178;
const BEFORE = 0.02;
const AFTER = 0.06;
const FADE = 0.005;

export function rootMeanSquare(samples: Float32Array): number {
	return Math.sqrt(samples.reduce((sum, sample) => sum + sample * sample, 0) / samples.length);
}

/** Cuts the silence before and after the speech down to 20 and 60 ms, and fades both cuts. */
export function trimSilence({ samples, sampleRate }: Sound): Sound {
	const frame = Math.round(FRAME * sampleRate);
	const loudness: number[] = [];
	for (let at = 0; at < samples.length; at += frame) loudness.push(rootMeanSquare(samples.subarray(at, at + frame)));
	const threshold = SILENCE * Math.max(...loudness);
	if (!(threshold > 0)) throw new Error('nothing but silence');
	const isSpeech = (value: number) => value > threshold;
	const start = Math.max(0, loudness.findIndex(isSpeech) * frame - Math.round(BEFORE * sampleRate));
	const end = Math.min(samples.length, (loudness.findLastIndex(isSpeech) + 1) * frame + Math.round(AFTER * sampleRate));
	const cut = samples.slice(start, end);
	const fade = Math.round(FADE * sampleRate);
	for (let at = 0; at < fade; at++) {
		cut[at] = (cut[at] ?? 0) * (at / fade);
		cut[cut.length - 1 - at] = (cut[cut.length - 1 - at] ?? 0) * (at / fade);
	}
	return { samples: cut, sampleRate };
}

/**
 * Brings a sound to `LEVEL`.
 * @throws Error when its peaks would be clipped there
 */
export function level({ samples, sampleRate }: Sound): Sound {
	const gain = LEVEL / rootMeanSquare(samples);
	const levelled = samples.map((sample) => sample * gain);
	const peak = levelled.reduce((most, sample) => Math.max(most, Math.abs(sample)), 0);
	if (!(peak <= 1)) throw new Error(`its peak would be ${peak.toFixed(2)} of full scale`);
	return { samples: levelled, sampleRate };
}
