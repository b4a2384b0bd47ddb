/** Mono sound: samples from -1 to 1. */
export interface Sound {
	samples: Float32Array;
	/** hertz */
	sampleRate: number;
}

const HEADER = 44;

/** RIFF WAVE with 16-bit PCM, one channel (format tag 1 of the "Multimedia Programming Interface", IBM and Microsoft, 1991). */
export function encodeWav({ samples, sampleRate }: Sound): Buffer {
	const wav = Buffer.alloc(HEADER + samples.length * 2);
	wav.write('RIFF', 0, 'latin1');
	wav.writeUInt32LE(wav.length - 8, 4);
	wav.write('WAVEfmt ', 8, 'latin1');
	wav.writeUInt32LE(16, 16);
	wav.writeUInt16LE(1, 20);
	wav.writeUInt16LE(1, 22);
	wav.writeUInt32LE(sampleRate, 24);
	wav.writeUInt32LE(sampleRate * 2, 28);
	wav.writeUInt16LE(2, 32);
	wav.writeUInt16LE(16, 34);
	wav.write('data', 36, 'latin1');
	wav.writeUInt32LE(samples.length * 2, 40);
	samples.forEach((sample, index) => wav.writeInt16LE(Math.round(sample * 32767), HEADER + index * 2));
	return wav;
}

/**
 * Reads what `encodeWav` writes, with other chunks skipped.
 * @throws Error for anything but 16-bit PCM of one channel
 */
export function decodeWav(wav: Buffer): Sound {
	if (wav.toString('latin1', 0, 4) !== 'RIFF' || wav.toString('latin1', 8, 12) !== 'WAVE')
		throw new Error('not a RIFF WAVE file');
	let sampleRate = 0;
	for (let at = 12; at + 8 <= wav.length;) {
		const name = wav.toString('latin1', at, at + 4);
		const size = wav.readUInt32LE(at + 4);
		const body = wav.subarray(at + 8, at + 8 + size);
		if (name === 'fmt ') {
			const [format, channels, bits] = [body.readUInt16LE(0), body.readUInt16LE(2), body.readUInt16LE(14)];
			if (format !== 1 || channels !== 1 || bits !== 16) throw new Error('not 16-bit PCM of one channel');
			sampleRate = body.readUInt32LE(4);
		}
		if (name === 'data') {
			if (sampleRate === 0) throw new Error('sound data before its format');
			const samples = Float32Array.from(
				{ length: body.length >> 1 },
				(_, index) => body.readInt16LE(index * 2) / 32767
			);
			return { samples, sampleRate };
		}
		at += 8 + size + (size % 2);
	}
	throw new Error('no sound data');
}
