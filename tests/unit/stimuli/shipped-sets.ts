import { resolve } from 'node:path';
import { listSetFolders, readSet } from '../../../src/lib/stimuli/read-set';
import type { ItemSet } from '../../../src/lib/stimuli/schema';

export const STIMULI = resolve('stimuli');

/** Every set that comes with Wordkeep, read from its folder. */
export const shippedSets: ItemSet[] = await Promise.all((await listSetFolders(STIMULI)).map(readSet));

export function shippedSet(id: string): ItemSet {
	const set = shippedSets.find((candidate) => candidate.id === id);
	if (set === undefined) throw new Error(`there is no set ${id}`);
	return set;
}
