import type { ExclusionReason, Trial } from '$lib/mapping/case-state';
import type { TaskLanguage } from '$lib/mapping/events';
import type { Rule, SiteVerdict, Verdict } from '$lib/mapping/verdict';
import type { Hemisphere, ResponseClass, Score } from '$lib/mapping/vocabulary';
import { milliamps, timeOfDay } from './format';
import { CAUTIONS, CLASS_NAMES, KIND_NAMES, languageName, PURPOSE_NAMES, taskName, VERDICT_NAMES } from './trade';

const decimals = new Intl.NumberFormat('en', {
	minimumFractionDigits: 1,
	maximumFractionDigits: 1,
	roundingMode: 'floor'
});

/** Words of the surgeon's screen: few, because every one of them is read from three metres. */
export const SURGEON = {
	title: 'Surgeon screen',
	tags: 'Results of all tags',
	noTags: 'No tag yet',
	noTrial: 'No trial yet',
	testAgain: 'Test again',
	notScored: 'Not scored',
	contested: 'Contested',
	bar: (number: number, pair: string) => `Bar ${number}: ${pair}`,
	complete: 'complete',
	more: (left: number) => `and ${left} more`,
	evenMore: () => 'and more',
	older: ['This screen is older than the case log.', 'Results are hidden.', 'Load the page again.'],
	setUp: {
		legend: 'Before use',
		distance: 'Read from, metres',
		scale: (calibrated: boolean) =>
			calibrated ? 'Scale: measured with a card.' : 'Scale: assumed. Measure it with a card.'
	}
};

/** "1 to go". */
export function toGo(remaining: number): string {
	return `${remaining} to go`;
}

/** "1/3". */
export function share({ disturbed, valid }: Pick<SiteVerdict, 'disturbed' | 'valid'>): string {
	return `${disturbed}/${valid}`;
}

/** A task and language as short as the case allows. */
export function pairName(pair: TaskLanguage, severalLanguages: boolean): string {
	return severalLanguages ? `${taskName(pair.task)} ${languageName(pair.language)}` : taskName(pair.task);
}

export function countName(verdict: Verdict, count: number): string {
	return `${count} ${VERDICT_NAMES[verdict]}`;
}

/** What was under test: "Tag 7", or a control. */
export function subject({ tag, stimulated }: Pick<Trial, 'tag' | 'stimulated'>): string {
	return stimulated && tag !== null ? `Tag ${tag}` : 'Control';
}

/** What a trial gave: its kinds, or why it gave nothing yet. */
export function outcome(
	trial: Trial,
	status: 'not-scored' | 'contested' | 'not-counted' | 'scored'
): { text: string; short?: string }[] {
	if (status === 'not-scored') return [{ text: 'not scored yet', short: 'not scored' }];
	if (status === 'contested') return [{ text: 'contested' }];
	const kinds = trial.score ? [trial.score.score, ...(trial.score.also ?? [])] : [];
	const names = kinds.map((kind) => KIND_NAMES[kind]).join(', ');
	if (status === 'scored') return [{ text: names }];
	const [reason] = trial.excluded;
	return [{ text: 'not counted' }, { text: reason ? reasonName(reason) : names }];
}

function reasonName({ why, detail }: ExclusionReason): string {
	if (why === 'not-shown') return 'not shown';
	if (why === 'other-tag') return `stimulator says tag ${detail}`;
	return KIND_NAMES[detail as Score] ?? detail;
}

/** How far a result is: "1 of 2 disturbed", "1 to go", "will be positive". That it will be negative is never said. */
export function progress(row: SiteVerdict, asked: ResponseClass): { text: string; short?: string }[] {
	const of = `${row.disturbed} of ${row.valid}`;
	const disturbed = `${of} disturbed`;
	return [
		...(row.valid > 0
			? [{ text: asked === 'language' ? disturbed : `${disturbed}, ${CLASS_NAMES[asked]}`, short: of }]
			: []),
		...(row.remaining > 0 ? [{ text: toGo(row.remaining) }] : []),
		...(row.settled === 'positive' ? [{ text: 'will be positive' }] : [])
	];
}

export function circumstances(trial: Trial, severalLanguages: boolean): string[] {
	return [
		...(trial.purpose !== null && trial.purpose !== 'mapping' ? [PURPOSE_NAMES[trial.purpose]] : []),
		...(trial.milliamps === null ? [] : [milliamps(trial.milliamps)]),
		pairName(trial, severalLanguages)
	];
}

/** "2 (1/3)", with the class where it is not language, after the task and language where they are given. */
export function againName(
	again: { tag: string; class: ResponseClass; disturbed: number; valid: number },
	pair: string | null
): string {
	const of = again.class === 'language' ? share(again) : `${share(again)} ${CLASS_NAMES[again.class]}`;
	return `${pair === null ? '' : `${pair}: `}${again.tag} (${of})`;
}

/** "1 to go: 6, 12"; neighbours are drawn together, and a long list is counted. */
export function toGoAt(remaining: number, tags: readonly string[]): string {
	const runs = tagRuns(tags);
	return `${toGo(remaining)}: ${runs.length > 8 ? `${tags.length} tags` : runs.join(', ')}`;
}

function tagRuns(tags: readonly string[]): string[] {
	const runs: string[][] = [];
	for (const tag of tags) {
		const run = runs.at(-1);
		const before = run?.at(-1);
		if (run && before !== undefined && Number(tag) === Number(before) + 1) run.push(tag);
		else runs.push([tag]);
	}
	return runs.flatMap((run) => (run.length > 2 ? [`${run[0]} to ${run.at(-1)}`] : run));
}

export function willBePositive(tags: readonly string[]): string {
	return `will be positive: ${tags.join(', ')}`;
}

/** "Tag 7: positive, now open", and when. */
export function changeAway(
	changes: readonly {
		tag: string;
		to: Verdict;
		of: (TaskLanguage & { class: ResponseClass }) | null;
	}[],
	at: number,
	zone: string
): string[] {
	const one = ({ tag, to, of }: (typeof changes)[number]) => {
		const what = of && [pairName(of, true), ...(of.class === 'language' ? [] : [CLASS_NAMES[of.class]])].join(' ');
		return `Tag ${tag}${what ? `, ${what}` : ''}: was positive, now ${VERDICT_NAMES[to]}`;
	};
	return [...changes.map(one), timeOfDay(at, zone)];
}

/** "Not up to date since 09:31:07", and why. */
export function notUpToDate(why: 'server' | 'examiner' | 'waiting', since: number, zone: string): string[] {
	const causes = {
		server: 'server not heard',
		examiner: 'examiner not heard',
		waiting: 'entries wait to be sent'
	};
	return [`Not up to date since ${timeOfDay(since, zone)}`, causes[why]];
}

/** The screen is too small for so many numbers at their size: it says how near one has to stand. */
export function readableFrom(metres: number): { text: string; short: string } {
	const from = `read from ${decimals.format(metres)} m`;
	return { text: `Rings: ${from}`, short: from };
}

export function caseLine(
	{ code, hemisphere, languages }: { code: string; hemisphere: Hemisphere; languages: string[] },
	{ minTrials, share: [part, whole] }: Rule
): string[] {
	return [
		code,
		`${hemisphere} hemisphere`,
		languages.map(languageName).join(', '),
		`positive: at least ${minTrials} trials, ${part}/${whole} disturbed`,
		CAUTIONS.rule
	];
}

/** What a bar says to those who hear it. */
export function barName(pair: TaskLanguage, { verdict }: { verdict: Verdict }): string {
	return `${taskName(pair.task)}, ${languageName(pair.language)}, ${VERDICT_NAMES[verdict]}`;
}
