import { fold } from './fold';
import { grid } from './grid';
import type { Plan } from './plan';
import { post } from './post';
import { present } from './present';
import { weight } from './weight';

const BENCHMARKS: Record<string, (plan: Plan) => Promise<void> | void> = { fold, post, present, grid, weight };

const FULL: Plan = { runs: 5, share: 1 };
/** To try a change: too few measurements for a p99. */
const QUICK: Plan = { runs: 3, share: 0.2 };

const given = process.argv.slice(2);
const plan = given.includes('--quick') ? QUICK : FULL;
const asked = given.filter((word) => word !== '--quick');
const unknown = asked.filter((name) => !(name in BENCHMARKS));
if (unknown.length > 0) {
	console.error(`There is no benchmark ${unknown.join(', ')}. There are: ${Object.keys(BENCHMARKS).join(', ')}.`);
	process.exit(1);
}

console.log('What counts is the ratio to the control of the same run; times in themselves are those of this machine.');
for (const name of asked.length > 0 ? asked : Object.keys(BENCHMARKS)) await BENCHMARKS[name]!(plan);
