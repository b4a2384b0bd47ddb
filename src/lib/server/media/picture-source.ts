import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { join } from 'node:path';

const require = createRequire(import.meta.url);

/** The part of an icon package's icons.json that is read (the open format of the @iconify-json packages). */
interface IconFile {
	width?: number;
	height?: number;
	icons: Record<string, { body: string; width?: number; height?: number }>;
	aliases?: Record<string, { parent: string }>;
}

const iconFiles = new Map<string, Promise<IconFile>>();

function iconFile(name: string): Promise<IconFile> {
	let file = iconFiles.get(name);
	if (file === undefined) {
		file = readFile(require.resolve(`${name}/icons.json`), 'utf8').then((text) => JSON.parse(text) as IconFile);
		iconFiles.set(name, file);
	}
	return file;
}

/** The package part of `package:icon`, or null for a file in the set's own folder. */
export function picturePackage(reference: string): string | null {
	return reference.startsWith('@') ? reference.slice(0, reference.indexOf(':')) : null;
}

/**
 * The picture that a set refers to, as SVG or in the format of its own file.
 * @throws Error naming the reference when it does not exist
 */
export async function readPicture(reference: string, folder: string): Promise<Buffer> {
	const from = picturePackage(reference);
	if (from === null) {
		return readFile(join(folder, reference)).catch((cause) => {
			throw new Error(`${join(folder, reference)} cannot be read`, { cause });
		});
	}
	const file = await iconFile(from);
	const name = reference.slice(from.length + 1);
	const icon = file.icons[file.aliases?.[name]?.parent ?? name];
	if (icon === undefined) throw new Error(`${from} has no picture ${name}`);
	const [width, height] = [icon.width ?? file.width ?? 16, icon.height ?? file.height ?? 16];
	return Buffer.from(
		`<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}" viewBox="0 0 ${width} ${height}">${icon.body}</svg>`
	);
}
