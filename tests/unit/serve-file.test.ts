import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { serveFile } from '$lib/server/media/serve-file';

const PICTURE = `${'0123456789abcdef'.repeat(2)}.webp`;
const SOUND = `${'f'.repeat(32)}.wav`;
let folder: string;

beforeAll(async () => {
	folder = await mkdtemp(join(tmpdir(), 'wordkeep-media-'));
	await writeFile(join(folder, PICTURE), 'picture');
	await writeFile(join(folder, SOUND), 'sound');
	await writeFile(join(folder, 'index.json'), 'what each file is');
});
afterAll(() => rm(folder, { recursive: true }));

describe('a media file', () => {
	it('is served with its type, for ever', async () => {
		const response = (await serveFile(folder, PICTURE, null))!;
		expect(response.status).toBe(200);
		expect(response.headers.get('content-type')).toBe('image/webp');
		expect(response.headers.get('cache-control')).toBe('public, max-age=31536000, immutable');
		expect(await response.text()).toBe('picture');
		expect((await serveFile(folder, SOUND, null))!.headers.get('content-type')).toBe('audio/wav');
	});

	// RFC 9110, section 13.1.2: If-None-Match compares weakly, in a list, or with anything
	it.each([[`"${PICTURE}"`], [`"other", W/"${PICTURE}"`], ['*']])(
		'is not sent again to one that has %s',
		async (tag) => {
			const response = (await serveFile(folder, PICTURE, tag))!;
			expect(response.status).toBe(304);
			expect(await response.text()).toBe('');
		}
	);

	it('is sent to one that has another', async () => {
		expect((await serveFile(folder, PICTURE, `"${SOUND}"`))!.status).toBe(200);
	});

	it.each([
		['index.json'],
		['../secret.webp'],
		[`${'0'.repeat(32)}.webp`],
		[`${PICTURE}/`],
		[`A${PICTURE.slice(1)}`],
		[`${'f'.repeat(32)}.webp`]
	])('is not there under %s', async (name) => {
		expect(await serveFile(folder, name, '*')).toBeNull();
	});
});
