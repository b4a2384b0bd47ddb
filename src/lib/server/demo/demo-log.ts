import { v4, v7 } from 'uuid';
import type { AnyCaseEvent, EventData, EventType } from '$lib/mapping/events';
import { RUNNING_TASKS } from '$lib/mapping/vocabulary';
import { copyForCase, type CatalogueSet } from '$lib/stimuli/catalogue';
import { FINISHED, finishedTrials, PREPARED } from './scenario';

const DEVICE = 'demo';
const A_SECOND = 1000;

/** Makes entries one after the other, in an invented time. */
class Diary {
	readonly entries: AnyCaseEvent[] = [];
	#now: number;

	constructor(begins: string) {
		this.#now = Date.parse(begins);
	}

	wait(milliseconds: number): void {
		this.#now += milliseconds;
	}

	note<T extends EventType>(type: T, data: EventData[T]): string {
		const id = v7({ msecs: this.#now });
		this.entries.push({
			id,
			type,
			v: 1,
			at: new Date(this.#now).toISOString(),
			device: DEVICE,
			monotonic: this.entries.length * A_SECOND,
			data
		} as unknown as AnyCaseEvent);
		return id;
	}
}

function prepare(diary: Diary, plan: { tags: string[] }, sets: CatalogueSet[]): void {
	diary.note('protocol-set', { required: [{ task: 'object-naming', language: 'en' }] });
	for (const set of sets) diary.note('items-copied', copyForCase(set));
	for (const tag of plan.tags) diary.note('tag-placed', { tag });
	diary.note('stimulation-settings', {
		technique: 'bipolar',
		frequency: 60,
		pulseWidth: 1,
		probe: 'bipolar, 5 mm between the tips',
		train: 4
	});
}

/** The log of a case that is ready for its first trial. */
export function preparedLog(sets: CatalogueSet[]): AnyCaseEvent[] {
	const diary = new Diary(new Date(Date.now() - 60_000).toISOString());
	prepare(diary, PREPARED, sets);
	return diary.entries;
}

/** The log of a case that is over. */
export function finishedLog(sets: CatalogueSet[]): AnyCaseEvent[] {
	const diary = new Diary(FINISHED.begins);
	prepare(diary, FINISHED, sets);
	const run = v4();
	diary.note('run-opened', { run, purpose: 'mapping', lead: DEVICE });
	const used = new Map<string, number>();
	for (const { tag, set: id, score, also, said, milliamps = null } of finishedTrials()) {
		const set = sets.find((candidate) => candidate.id === id);
		if (!set) throw new RangeError(`no item set ${id}`);
		const next = used.get(id) ?? 0;
		used.set(id, next + 1);
		const trial = v4();
		const { task, language } = set;
		const item = set.items[RUNNING_TASKS.includes(task) ? 0 : next % set.items.length]!.id;
		diary.wait(FINISHED.every);
		diary.note('trial-presented', { trial, item, task, language, tag, stimulated: tag !== null, milliamps, run });
		diary.wait(A_SECOND / 10);
		diary.note('trial-onset', { trial, shown: true, source: 'examiner' });
		diary.wait(3 * A_SECOND);
		diary.note('trial-scored', {
			trial,
			score,
			...(also ? { also } : {}),
			...(said ? { said } : {}),
			corrects: []
		});
	}
	diary.wait(A_SECOND);
	diary.note('run-closed', { run });
	return diary.entries;
}
