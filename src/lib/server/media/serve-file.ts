import { readFile } from 'node:fs/promises';
import { join } from 'node:path';

/** Where the pictures and sounds of the item sets lie. */
export function mediaFolder(): string {
	return process.env.MEDIA_DIR ?? '.media';
}

const NAME = /^[0-9a-f]{32}\.(webp|wav)$/;
const TYPES: Record<string, string> = { webp: 'image/webp', wav: 'audio/wav' };

/**
 * Answers with a media file. Its name is the hash of its content, so that it never changes: browsers may keep it for
 * ever (RFC 8246), and the name is its entity tag (RFC 9110, section 8.8.3).
 *
 * @returns null for a name that is none, or that is not there
 */
export async function serveFile(folder: string, file: string, ifNoneMatch: string | null): Promise<Response | null> {
	const extension = NAME.exec(file)?.[1];
	const type = extension && TYPES[extension];
	if (!type) return null;
	const content = await readFile(join(folder, file)).catch((failure: NodeJS.ErrnoException) => {
		if (failure.code === 'ENOENT') return null;
		throw failure;
	});
	if (!content) return null;
	const tag = `"${file}"`;
	const headers = { etag: tag, 'cache-control': 'public, max-age=31536000, immutable' };
	if (matches(ifNoneMatch, tag)) return new Response(null, { status: 304, headers });
	return new Response(new Uint8Array(content), {
		headers: { ...headers, 'content-type': type, 'content-length': String(content.byteLength) }
	});
}

function matches(ifNoneMatch: string | null, tag: string): boolean {
	const known = (ifNoneMatch ?? '').split(',').map((one) => one.trim().replace(/^W\//, ''));
	return known.includes(tag) || known.includes('*');
}
