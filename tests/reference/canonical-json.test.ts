import { describe, expect, it } from 'vitest';
import { canonicalJson } from '../../src/lib/server/log/chain';
import { canonical } from '../api/canonical';

/** The double of these 16 hexadecimal digits, as RFC 8785 writes them. */
function double(hex: string): number {
	return Buffer.from(hex, 'hex').readDoubleBE();
}

describe.each([
	['the program', canonicalJson],
	['the tests of the chain', canonical]
])('canonical JSON of %s', (_, write) => {
	// RFC 8785, section 3.2.2 and, as bytes, section 3.2.4.
	it('has numbers, text and literals as the example of the standard', () => {
		const given = JSON.parse(String.raw`{
			"numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
			"string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
			"literals": [null, true, false]
		}`);
		const bytes = Buffer.from(write(given), 'utf8').toString('hex');
		expect(bytes).toBe(
			'7b226c69746572616c73223a5b6e756c6c2c747275652c66616c73655d2c226e' +
				'756d62657273223a5b3333333333333333332e333333333333332c31652b3330' +
				'2c342e352c302e3030322c31652d32375d2c22737472696e67223a22e282ac24' +
				'5c75303030665c6e4127425c225c5c5c5c5c222f227d'
		);
	});

	// RFC 8785, section 3.2.3.
	it('sorts names by UTF-16 code units', () => {
		const given = JSON.parse(String.raw`{
			"\u20ac": "Euro Sign",
			"\r": "Carriage Return",
			"\ufb33": "Hebrew Letter Dalet With Dagesh",
			"1": "One",
			"\ud83d\ude00": "Emoji: Grinning Face",
			"\u0080": "Control",
			"\u00f6": "Latin Small Letter O With Diaeresis"
		}`);
		expect([...write(given).matchAll(/:"([^"]*)"/g)].map(([, value]) => value)).toEqual([
			'Carriage Return',
			'One',
			'Control',
			'Latin Small Letter O With Diaeresis',
			'Euro Sign',
			'Emoji: Grinning Face',
			'Hebrew Letter Dalet With Dagesh'
		]);
	});

	// RFC 8785, appendix B.
	it.each([
		['0000000000000000', '0'],
		['8000000000000000', '0'],
		['0000000000000001', '5e-324'],
		['8000000000000001', '-5e-324'],
		['7fefffffffffffff', '1.7976931348623157e+308'],
		['ffefffffffffffff', '-1.7976931348623157e+308'],
		['4340000000000000', '9007199254740992'],
		['c340000000000000', '-9007199254740992'],
		['4430000000000000', '295147905179352830000'],
		['44b52d02c7e14af5', '9.999999999999997e+22'],
		['44b52d02c7e14af6', '1e+23'],
		['44b52d02c7e14af7', '1.0000000000000001e+23'],
		['444b1ae4d6e2ef4e', '999999999999999700000'],
		['444b1ae4d6e2ef4f', '999999999999999900000'],
		['444b1ae4d6e2ef50', '1e+21'],
		['3eb0c6f7a0b5ed8c', '9.999999999999997e-7'],
		['3eb0c6f7a0b5ed8d', '0.000001'],
		['41b3de4355555553', '333333333.3333332'],
		['41b3de4355555554', '333333333.33333325'],
		['41b3de4355555555', '333333333.3333333'],
		['41b3de4355555556', '333333333.3333334'],
		['41b3de4355555557', '333333333.33333343'],
		['becbf647612f3696', '-0.0000033333333333333333'],
		['43143ff3c1cb0959', '1424953923781206.2']
	])('writes the number %s as %s', (hex, text) => {
		expect(write([double(hex)])).toBe(`[${text}]`);
	});
});

describe('canonical JSON of the program', () => {
	// RFC 8785, section 3.2.2.3: neither can be written.
	it.each(['7fffffffffffffff', '7ff0000000000000'])('has no form for %s', (hex) => {
		expect(() => canonicalJson([double(hex)])).toThrow();
	});
});
