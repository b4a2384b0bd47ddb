import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { effect } from '../../../src/lib/mapping/effect';
import { amend, DEFAULT_PROTOCOL, type Protocol } from '../../../src/lib/mapping/protocol';
import { effectTable, overridesOf, protocolChange, type EffectTable } from '../../../src/lib/mapping/protocol-change';
import { CLASSES, EFFECTS, ERROR_KINDS } from '../../../src/lib/mapping/vocabulary';

const anyEffect = fc.constantFrom(...EFFECTS);
const anyTable = fc.record(
	Object.fromEntries(ERROR_KINDS.map((kind) => [kind, fc.record({ language: anyEffect, 'speech-motor': anyEffect })]))
) as fc.Arbitrary<EffectTable>;

describe('the table of effects', () => {
	test('the usual one needs no entry', () => {
		expect(overridesOf(effectTable({ effects: {} }))).toEqual({});
	});

	test('any other one comes back out of its overrides, kind by kind', () => {
		fc.assert(
			fc.property(anyTable, (table) => {
				const effects = overridesOf(table);
				for (const kind of ERROR_KINDS) {
					for (const asked of CLASSES) {
						expect(effect(kind, { protocol: { effects }, class: asked })).toBe(table[kind][asked]);
					}
				}
			})
		);
	});

	test('holds only what differs from the usual', () => {
		const table = effectTable({ effects: {} });
		table.dysarthria = { ...table.dysarthria, language: 'disturbed' };
		expect(overridesOf(table)).toEqual({ dysarthria: { language: 'disturbed' } });
	});
});

describe('the entry of a change', () => {
	test('is none when nothing differs, whatever the order of the lists', () => {
		const again: Protocol = {
			...DEFAULT_PROTOCOL,
			kinds: DEFAULT_PROTOCOL.kinds.toReversed(),
			timing: { lead: 100, pause: 4000, shown: 4000 }
		};
		expect(protocolChange(DEFAULT_PROTOCOL, again)).toBeNull();
	});

	test('holds the changed fields whole and no other', () => {
		const after: Protocol = {
			...DEFAULT_PROTOCOL,
			rule: { minTrials: 4, share: [2, 3] },
			timing: { ...DEFAULT_PROTOCOL.timing, shown: null }
		};
		expect(protocolChange(DEFAULT_PROTOCOL, after)).toEqual({
			rule: { minTrials: 4, share: [2, 3] },
			timing: { shown: null, pause: 4000, lead: 100 }
		});
	});

	test('leads from one protocol to the other', () => {
		const anyProtocol: fc.Arbitrary<Protocol> = fc.record({
			rule: fc.record({ minTrials: fc.integer({ min: 1, max: 20 }), share: fc.constant<[number, number]>([2, 3]) }),
			effects: anyTable.map(overridesOf),
			later: fc.constantFrom('excluded' as const, 'counted' as const),
			required: fc.subarray([
				{ task: 'reading', language: 'en' },
				{ task: 'counting', language: 'de' }
			]),
			kinds: fc.subarray([...ERROR_KINDS]),
			timing: fc.record({ shown: fc.option(fc.integer({ min: 1 })), pause: fc.nat(), lead: fc.nat() })
		});
		fc.assert(
			fc.property(anyProtocol, anyProtocol, (before, after) => {
				const change = protocolChange(before, after);
				const reached = change ? amend(before, change) : before;
				expect({ ...reached, kinds: reached.kinds.toSorted() }).toEqual({ ...after, kinds: after.kinds.toSorted() });
			})
		);
	});
});
