import type { EffectOverrides, EventData } from './events';
import { effect } from './effect';
import type { Protocol } from './protocol';
import { CLASSES, ERROR_KINDS, type Effect, type ErrorKind, type ResponseClass } from './vocabulary';

/** What every error kind does to every class, defaults and overrides together. */
export type EffectTable = Record<ErrorKind, Record<ResponseClass, Effect>>;

/** The effects in force under a protocol, kind by kind. */
export function effectTable(protocol: Pick<Protocol, 'effects'>): EffectTable {
	const table = ERROR_KINDS.map((kind) => [
		kind,
		Object.fromEntries(CLASSES.map((asked) => [asked, effect(kind, { protocol, class: asked })]))
	]);
	return Object.fromEntries(table) as EffectTable;
}

/** The overrides that make a table: only what differs from the defaults. */
export function overridesOf(table: EffectTable): EffectOverrides {
	const overrides: EffectOverrides = {};
	for (const kind of ERROR_KINDS) {
		for (const asked of CLASSES) {
			const wanted = table[kind][asked];
			if (wanted !== effect(kind, { class: asked })) overrides[kind] = { ...overrides[kind], [asked]: wanted };
		}
	}
	return overrides;
}

/**
 * The entry that turns one protocol into another: the fields that differ, each whole.
 *
 * @returns null when nothing differs
 */
export function protocolChange(before: Protocol, after: Protocol): EventData['protocol-set'] | null {
	const changed = (Object.keys(after) as (keyof Protocol)[]).filter(
		(field) => comparable(field, before[field]) !== comparable(field, after[field])
	);
	return changed.length === 0 ? null : Object.fromEntries(changed.map((field) => [field, after[field]]));
}

/** Lists in which the order says nothing. */
const UNORDERED: readonly (keyof Protocol)[] = ['kinds', 'required'];

function comparable(field: keyof Protocol, value: unknown): string {
	if (!UNORDERED.includes(field)) return canonical(value);
	return (value as unknown[]).map(canonical).sort().join();
}

/** Text that is the same for the same value, whatever the order of an object's fields. */
function canonical(value: unknown): string {
	return JSON.stringify(value, (_, part: unknown) =>
		typeof part === 'object' && part !== null && !Array.isArray(part)
			? Object.fromEntries(Object.entries(part).sort(([a], [b]) => (a < b ? -1 : 1)))
			: part
	);
}
