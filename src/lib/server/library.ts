import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Catalogue, CatalogueSet } from '$lib/stimuli/catalogue';
import { REFUSALS } from '$lib/messages/refusals';
import { mediaFolder } from './media/serve-file';

/** The item sets were not built on this machine. */
export class LibraryMissing extends Error {
	constructor() {
		super(REFUSALS.noLibrary);
	}
}

/** An item set as lists show it: how many items, not which. */
export type SetSummary = Omit<CatalogueSet, 'items'> & { count: number };

let catalogue: Catalogue | undefined;

/** @throws LibraryMissing */
async function readCatalogue(): Promise<Catalogue> {
	if (catalogue) return catalogue;
	let text: string;
	try {
		text = await readFile(join(mediaFolder(), 'catalogue.json'), 'utf8');
	} catch (failure) {
		if ((failure as NodeJS.ErrnoException).code === 'ENOENT') throw new LibraryMissing();
		throw failure;
	}
	catalogue = JSON.parse(text) as Catalogue;
	return catalogue;
}

/** @throws LibraryMissing */
export async function listSets(): Promise<SetSummary[]> {
	return (await readCatalogue()).sets.map(({ items, ...set }) => ({ ...set, count: items.length }));
}

/** @throws LibraryMissing */
export async function findSet(id: string): Promise<CatalogueSet | null> {
	return (await readCatalogue()).sets.find((set) => set.id === id) ?? null;
}
