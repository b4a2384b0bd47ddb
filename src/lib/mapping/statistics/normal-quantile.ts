import { requireProbability } from './domain';

/*
 * Coefficients of PPND16 in Wichura, "Algorithm AS 241: The Percentage Points of the Normal Distribution",
 * Applied Statistics 1988;37:477-484, lowest power first, rounded to the nearest double.
 */
const CENTRE = {
	above: [
		3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987, 67265.7709270087,
		33430.57558358813, 2509.0809287301227
	],
	below: [
		1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
		28729.085735721943, 5226.495278852546
	]
};
const TAIL = {
	above: [
		1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
		0.2417807251774506, 0.022723844989269184, 0.0007745450142783414
	],
	below: [
		1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
		0.0005475938084995345, 1.0507500716444169e-9
	]
};
const FAR_TAIL = {
	above: [
		6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
		0.0012426609473880784, 0.000027115555687434876, 2.0103343992922881e-7
	],
	below: [
		1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133, 0.000018463183175100548,
		1.421511758316446e-7, 2.0442631033899397e-15
	]
};

/**
 * The value that a standard normal variable stays below with probability `p`, to about 1 part in 10^16 (Wichura 1988,
 * AS 241). Minus infinity for 0, infinity for 1.
 *
 * @throws RangeError when `p` is outside 0..1
 */
export function normalQuantile(p: number): number {
	requireProbability('p', p);
	const fromCentre = p - 0.5;
	if (Math.abs(fromCentre) <= 0.425) return fromCentre * quotient(CENTRE, 0.180625 - fromCentre * fromCentre);

	const tail = fromCentre < 0 ? p : 1 - p;
	return Math.sign(fromCentre) * distance(tail);
}

function distance(tail: number): number {
	if (tail === 0) return Infinity;
	const r = Math.sqrt(-Math.log(tail));
	return r <= 5 ? quotient(TAIL, r - 1.6) : quotient(FAR_TAIL, r - 5);
}

function quotient({ above, below }: { above: number[]; below: number[] }, x: number): number {
	return polynomial(above, x) / polynomial(below, x);
}

function polynomial(coefficients: number[], x: number): number {
	return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}
