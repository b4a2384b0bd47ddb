import { readFileSync } from 'node:fs';
import { UnreadableExport } from '../lib/server/exports/read-trials';
import { rescore, rescoredCsv } from '../lib/server/exports/rescore';

/** Prints the verdicts of an exported file of trials, worked out anew under the protocol it carries. */
function main(file: string | undefined): void {
	if (file === undefined) throw new UnreadableExport('Name the file: npm run --silent rescore -- trials.csv');
	try {
		const { results, differing } = rescore(textOf(file));
		for (const { line, exported, found } of differing) {
			console.error(`${file}, row ${line}: exported as ${exported}; its score and protocol give ${found}`);
		}
		process.stdout.write(rescoredCsv(results));
	} catch (failure) {
		if (failure instanceof UnreadableExport) failure.message = `${file} cannot be read: ${failure.message}`;
		throw failure;
	}
}

function textOf(file: string): string {
	let bytes: Buffer;
	try {
		bytes = readFileSync(file);
	} catch (failure) {
		throw new UnreadableExport((failure as Error).message);
	}
	try {
		return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
	} catch {
		throw new UnreadableExport('it is not text in UTF-8');
	}
}

try {
	main(process.argv[2]);
} catch (failure) {
	if (!(failure instanceof UnreadableExport)) throw failure;
	console.error(failure.message);
	process.exitCode = 1;
}
