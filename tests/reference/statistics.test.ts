import { describe, expect, it } from 'vitest';
import { benjaminiHochberg } from '$lib/mapping/statistics/benjamini-hochberg';
import { binomialTail } from '$lib/mapping/statistics/binomial-tail';
import { expectedFalsePositives } from '$lib/mapping/statistics/expected-false-positives';
import { fisherExact, type Alternative, type TwoByTwo } from '$lib/mapping/statistics/fisher-exact';
import { holm } from '$lib/mapping/statistics/holm';
import { normalQuantile } from '$lib/mapping/statistics/normal-quantile';
import { wilson } from '$lib/mapping/statistics/wilson';

/** Agreement with a number as printed: within half a unit of its last digit, a fraction to 1 part in 10^13. */
function expectPrinted(actual: number, printed: string): void {
	const [part, whole] = printed.split('/');
	if (whole !== undefined) {
		expect(Math.abs((actual * Number(whole)) / Number(part) - 1), `${actual} for ${printed}`).toBeLessThan(1e-13);
		return;
	}
	const [digits = '', exponent = '0'] = printed.split('e');
	const decimals = digits.split('.')[1]?.length ?? 0;
	const halfUnit = 0.5 * 10 ** (Number(exponent) - decimals);
	expect(Math.abs(actual - Number(printed)), `${actual} for ${printed}`).toBeLessThanOrEqual(halfUnit * (1 + 1e-9));
}

describe('binomial tail: P(X >= k of n) at an error rate without stimulation', () => {
	it.each<[id: string, k: number, n: number, p: number, printed: string, source: string]>([
		['BIN-01', 2, 3, 0.1, '0.028', 'exact: 3 p^2 (1 - p) + p^3 = 7/250'],
		['BIN-01', 2, 3, 0.1, '7/250', 'exact: 3 p^2 (1 - p) + p^3 = 7/250'],
		['BIN-02', 2, 3, 0.25, '0.15625', 'exact: (9 + 1) / 64 = 5/32'],
		['BIN-02', 2, 3, 0.25, '5/32', 'exact: (9 + 1) / 64 = 5/32'],
		['BIN-03', 3, 4, 0.2, '0.0272', 'exact: 4 p^3 (1 - p) + p^4'],
		['BIN-03', 4, 6, 0.2, '0.01696', 'exact: 15 p^4 (1 - p)^2 + 6 p^5 (1 - p) + p^6'],
		['BIN-04', 3, 3, 0.05, '0.000125', 'exact: p^3'],
		['BIN-07', 2, 3, 0.8, '0.896', 'exact: 3 p^2 (1 - p) + p^3, the power when stimulation disturbs 8 of 10'],
		['two of three', 2, 3, 0.01, '0.000298', 'R 4.6.0, pbinom(1, 3, .01, lower.tail = FALSE)'],
		['two of three', 2, 3, 0.02, '0.001184', 'R 4.6.0, pbinom(1, 3, .02, lower.tail = FALSE)'],
		['two of three', 2, 3, 0.05, '0.00725', 'R 4.6.0, pbinom(1, 3, .05, lower.tail = FALSE)'],
		['two of three', 2, 3, 0.2, '0.104', 'R 4.6.0, pbinom(1, 3, .2, lower.tail = FALSE)'],
		['three of four', 3, 4, 0.01, '3.97e-6', 'R 4.6.0, pbinom(2, 4, .01, lower.tail = FALSE)'],
		['three of four', 3, 4, 0.02, '3.152e-5', 'R 4.6.0, pbinom(2, 4, .02, lower.tail = FALSE)'],
		['three of four', 3, 4, 0.05, '4.8125e-4', 'R 4.6.0, pbinom(2, 4, .05, lower.tail = FALSE)'],
		['three of four', 3, 4, 0.1, '0.0037', 'R 4.6.0, pbinom(2, 4, .1, lower.tail = FALSE)'],
		['three of four', 3, 4, 0.2, '0.0272', 'R 4.6.0, pbinom(2, 4, .2, lower.tail = FALSE)']
	])('%s: %i of %i at %f is %s (%s)', (_id, k, n, p, printed) => {
		expectPrinted(binomialTail(k, n, p), printed);
	});
});

describe('false positives expected over a field of sites, two of three', () => {
	it.each<[id: string, sites: number, p: number, expected: string, atLeastOne: string, source: string]>([
		['BIN-05', 20, 0.1, '0.56', '0.4333', 'exact: 20 x 0.028; 1 - 0.972^20'],
		['BIN-06', 20, 0.25, '3.125', '0.9666', 'exact: 20 x 5/32; 1 - (27/32)^20'],
		['13 sites', 13, 0.05, '0.0943', '0.0903', 'exact: 13 x 0.00725; 1 - 0.99275^13'],
		['20 sites', 20, 0.05, '0.145', '0.1354', 'exact: 20 x 0.00725; 1 - 0.99275^20'],
		['13 sites', 13, 0.1, '0.364', '0.3087', 'exact: 13 x 0.028; 1 - 0.972^13']
	])('%s: %i sites at %f give %s, at least one with %s (%s)', (_id, sites, p, expected, atLeastOne) => {
		const found = expectedFalsePositives(sites, 3, 2, p);
		expectPrinted(found.expected, expected);
		expectPrinted(found.atLeastOne, atLeastOne);
	});
});

describe("Fisher's exact test", () => {
	const HERRICK = 'Herrick et al., Anesth Analg 1997;84:1280, published p';
	it.each<[id: string, table: TwoByTwo, alternative: Alternative, printed: string, source: string]>([
		[
			'FIS-01',
			[
				[3, 1],
				[1, 3]
			],
			'greater',
			'0.2429',
			'tea tasting, published in the manual of R, fisher.test'
		],
		[
			'FIS-01',
			[
				[3, 1],
				[1, 3]
			],
			'greater',
			'0.2428571',
			'R 4.6.0, fisher.test'
		],
		[
			'FIS-01',
			[
				[3, 1],
				[1, 3]
			],
			'greater',
			'17/70',
			'exact: (16 + 1) / 70'
		],
		[
			'FIS-01',
			[
				[3, 1],
				[1, 3]
			],
			'two-sided',
			'0.4857143',
			'R 4.6.0, fisher.test'
		],
		[
			'FIS-01',
			[
				[3, 1],
				[1, 3]
			],
			'two-sided',
			'17/35',
			'exact: 2 x 17/70'
		],
		[
			'FIS-02',
			[
				[2, 15],
				[10, 3]
			],
			'less',
			'0.0004652',
			'twin convictions, table of the manual of R; exact'
		],
		[
			'FIS-02',
			[
				[2, 15],
				[10, 3]
			],
			'two-sided',
			'0.0005367',
			'twin convictions, table of the manual of R; exact'
		],
		[
			'FIS-02',
			[
				[10, 3],
				[2, 15]
			],
			'two-sided',
			'0.000536724',
			'R 4.6.0, fisher.test'
		],
		[
			'FIS-03',
			[
				[6, 1],
				[3, 9]
			],
			'two-sided',
			'0.02',
			'Hamberger et al., Brain 2005;128:2742, published p'
		],
		[
			'FIS-03',
			[
				[6, 1],
				[3, 9]
			],
			'two-sided',
			'0.0197666',
			'table of Hamberger 2005; exact'
		],
		[
			'FIS-03',
			[
				[6, 1],
				[3, 9]
			],
			'two-sided',
			'83/4199',
			'table of Hamberger 2005; exact'
		],
		[
			'FIS-04',
			[
				[13, 12],
				[1, 17]
			],
			'two-sided',
			'0.002',
			'Hamberger et al. 2007, published p'
		],
		[
			'FIS-04',
			[
				[13, 12],
				[1, 17]
			],
			'two-sided',
			'0.0022588',
			'table of Hamberger 2007; exact'
		],
		[
			'FIS-05b',
			[
				[6, 9],
				[0, 15]
			],
			'greater',
			'0.008',
			HERRICK
		],
		[
			'FIS-05b',
			[
				[6, 9],
				[0, 15]
			],
			'greater',
			'0.0084291',
			'table of Herrick 1997; exact'
		],
		[
			'FIS-05b',
			[
				[6, 9],
				[0, 15]
			],
			'two-sided',
			'0.0168582',
			'table of Herrick 1997; exact, twice the one-sided'
		],
		[
			'FIS-06',
			[
				[2, 1],
				[4, 76]
			],
			'greater',
			'0.0127883',
			'exact'
		],
		[
			'FIS-06',
			[
				[2, 1],
				[4, 76]
			],
			'greater',
			'1175/91881',
			'exact'
		],
		[
			'FIS-07',
			[
				[3, 0],
				[4, 76]
			],
			'greater',
			'0.0003809',
			'exact'
		],
		[
			'FIS-07',
			[
				[3, 0],
				[4, 76]
			],
			'greater',
			'35/91881',
			'exact'
		],
		[
			'FIS-07',
			[
				[1, 2],
				[4, 76]
			],
			'greater',
			'0.172016',
			'exact'
		],
		[
			'two of three, 8 of 80',
			[
				[2, 1],
				[8, 72]
			],
			'greater',
			'1135/30627',
			'exact'
		],
		[
			'three of three, 8 of 80',
			[
				[3, 0],
				[8, 72]
			],
			'greater',
			'0.0017958',
			'exact'
		],
		[
			'one of three, 8 of 80',
			[
				[1, 2],
				[8, 72]
			],
			'greater',
			'0.29448',
			'exact'
		],
		[
			'FIS-08',
			[
				[2, 1],
				[20, 60]
			],
			'greater',
			'0.1701222',
			'exact; positive by two of three, and yet no evidence'
		],
		[
			'FIS-09',
			[
				[0, 3],
				[4, 76]
			],
			'greater',
			'1',
			'every table has at least 0 in the first cell'
		]
	])('%s: %j %s is %s (%s)', (_id, table, alternative, printed) => {
		expectPrinted(fisherExact(table, alternative), printed);
	});
});

describe('Wilson interval, 95 %', () => {
	const NEWCOMBE = 'Newcombe, Stat Med 1998;17:857-872, method 3';
	it.each<[id: string, k: number, n: number, low: string, high: string, source: string]>([
		['WIL-01', 81, 263, '0.2553', '0.3662', NEWCOMBE],
		['WIL-01', 81, 263, '0.2552885', '0.3662096', 'data of Newcombe 1998, computed with R 4.6.0'],
		['WIL-02', 15, 148, '0.0624', '0.1605', NEWCOMBE],
		['WIL-03', 0, 20, '0.0000', '0.1611', NEWCOMBE],
		['WIL-03', 0, 20, '0.0000000', '0.1611252', 'data of Newcombe 1998, computed with R 4.6.0'],
		['WIL-04', 1, 29, '0.0061', '0.1718', NEWCOMBE],
		['WIL-05', 2, 3, '0.2076596', '0.9385081', 'R 4.6.0'],
		['WIL-05', 2, 3, '0.2077', '0.9385', 'score equation solved'],
		['WIL-05', 0, 3, '0.0000', '0.5615', 'score equation solved: z^2 / (3 + z^2)'],
		['WIL-05', 3, 3, '0.4385', '1.0000', 'score equation solved: 3 / (3 + z^2)'],
		['WIL-05', 3, 3, '0.4385030', '1.0000000', 'R 4.6.0'],
		['three of four', 3, 4, '0.3006', '0.9544', 'score equation solved'],
		['four of six', 4, 6, '0.3000', '0.9032', 'score equation solved'],
		['four of 80', 4, 80, '0.0196', '0.1216', 'score equation solved']
	])('%s: %i of %i is %s to %s (%s)', (_id, k, n, low, high) => {
		const [lower, upper] = wilson(k, n);
		expectPrinted(lower, low);
		expectPrinted(upper, high);
	});
});

describe('normal quantile', () => {
	const WICHURA = 'test data of Wichura, AS 241, Applied Statistics 1988;37:477-484';
	it.each<[p: number, z: string, source: string]>([
		[0.25, '-0.6744897501960817', WICHURA],
		[0.001, '-3.090232306167814', WICHURA],
		[1e-20, '-9.262340089798408', WICHURA],
		[0.975, '1.95996', 'any table of the normal distribution']
	])('of %d is %s (%s)', (p, z) => {
		expect(Math.abs(normalQuantile(p) / Number(z) - 1)).toBeLessThan(z.length > 10 ? 4e-16 : 3e-6);
	});
});

describe('adjustment for many sites', () => {
	/** Benjamini and Hochberg, J R Stat Soc B 1995;57:289-300: the fifteen p values of their example. */
	const FIFTEEN = [
		0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528, 0.759, 1
	];
	const FIFTEEN_BH =
		'0.0015 0.003 0.0095 0.035625 0.0603 0.063857 0.063857 0.0645 0.0765 0.486 0.581182 0.714875 0.753231 0.813214 1';
	const FIFTEEN_HOLM = '0.0015 0.0056 0.0247 0.114 0.2211 0.278 0.278 0.278 0.3213 1 1 1 1 1 1';
	/** Five sites against 4 errors in 80 control trials: Fisher, one-sided, exact arithmetic. */
	const FIVE_SITES = [3, 2, 1, 0, 2].map((k) =>
		fisherExact(
			[
				[k, 3 - k],
				[4, 76]
			],
			'greater'
		)
	);
	const FOUR = [0.01, 0.04, 0.03, 0.005];

	it.each<[id: string, adjust: (ps: number[]) => number[], ps: number[], printed: string, source: string]>([
		['BH-02', benjaminiHochberg, FIFTEEN, FIFTEEN_BH, 'p values of the 1995 paper; exact: min of p m / rank'],
		['HOLM-01', holm, FIFTEEN, FIFTEEN_HOLM, 'p values of the 1995 paper; exact: max of p (m - rank + 1)'],
		['HOLM-02', holm, FOUR, '0.03 0.06 0.06 0.02', 'R 4.6.0, p.adjust(method = "holm")'],
		['BH-04', benjaminiHochberg, FOUR, '0.02 0.04 0.04 0.02', 'R 4.6.0, p.adjust(method = "BH")'],
		['MUL-01', holm, FIVE_SITES, '0.001905 0.051153 0.344032 1 0.051153', 'exact'],
		['MUL-01', benjaminiHochberg, FIVE_SITES, '0.001905 0.021314 0.215020 1 0.021314', 'exact']
	])('%s: adjusted values (%#)', (_id, adjust, ps, printed) => {
		const wanted = printed.split(' ');
		const adjusted = adjust(ps);
		expect(adjusted).toHaveLength(wanted.length);
		adjusted.forEach((value, index) => expectPrinted(value, wanted[index]!));
	});

	it.each<[id: string, adjust: (ps: number[]) => number[], level: number, found: number, source: string]>([
		['BH-01', benjaminiHochberg, 0.05, 4, 'the paper of 1995, and the manual of SciPy, false_discovery_control'],
		['BH-03', benjaminiHochberg, 0.1, 9, 'exact: stepping up, 0.0459 is below 9/15 of 0.1'],
		['HOLM-01', holm, 0.05, 3, 'exact: 0.0095 is above 0.05 / 12'],
		['HOLM-01', holm, 0.1, 3, 'exact: 0.0095 is above 0.1 / 12']
	])('%s: findings among the fifteen (%#)', (_id, adjust, level, found) => {
		expect(adjust(FIFTEEN).map((p) => p <= level)).toEqual(FIFTEEN.map((_, index) => index < found));
	});
});
