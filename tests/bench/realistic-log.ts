import { v4, v7 } from 'uuid';
import type { EventData, EventType, LogEvent } from '../../src/lib/mapping/events';
import type { Score } from '../../src/lib/mapping/vocabulary';

const BEGINS = Date.parse('2031-03-05T08:00:00Z');
const A_SECOND = 1000;
const TAGS = Array.from({ length: 30 }, (_, index) => String(index + 1));
const ERRORS: Score[] = ['anomia', 'speech-arrest', 'semantic-paraphasia', 'dysarthria', 'delay', 'not-scorable'];

/**
 * The log of an invented mapping, far longer than a real one: tags, presentations, what the patient's screen did, and
 * scores; now and then a correction, a withdrawal, an exclusion, a pause or a control, and one change of the protocol.
 */
export function realisticLog(length: number): LogEvent[] {
	const log = new Log();
	for (const tag of TAGS) log.add('tag-placed', { tag });
	const run = v4();
	log.add('run-opened', { run, purpose: 'mapping', lead: 'examiner' });
	for (let nth = 0; log.entries.length < length; nth++) {
		if (nth === 1500) log.add('protocol-set', { rule: { minTrials: 4, share: [2, 3] } });
		addTrial(log, nth, run);
	}
	return log.entries.slice(0, length);
}

function addTrial(log: Log, nth: number, run: string): void {
	const trial = v4();
	const control = nth % 8 === 7;
	const spanish = nth % 5 === 4;
	log.pass(4 * A_SECOND);
	log.add('trial-presented', {
		trial,
		item: `item-${nth % 90}`,
		task: 'object-naming',
		language: spanish ? 'es' : 'en',
		tag: control ? null : TAGS[(nth * 7) % TAGS.length]!,
		stimulated: !control,
		milliamps: control ? null : 2 + (nth % 4) / 2,
		run,
		showAt: log.time(0.1 * A_SECOND)
	});
	const times = { planned: log.time(0.1 * A_SECOND), measured: log.time(0.108 * A_SECOND) };
	log.add('trial-onset', { trial, shown: nth % 97 !== 50, ...times, source: 'presentation-time' });
	log.pass(2 * A_SECOND);
	const first = log.add('trial-scored', { trial, score: scoreOf(nth), corrects: [] });
	if (nth % 25 === 10) log.add('trial-scored', { trial, score: 'intact', corrects: [first], note: 'heard again' });
	if (nth % 40 === 20) log.add('trial-corrected', { trial, tag: control ? null : TAGS[nth % TAGS.length]! });
	if (nth % 50 === 30) log.add('entry-withdrawn', { entry: first });
	if (nth % 60 === 40) log.add('trial-excluded', { trial, reason: 'afterdischarge' });
	if (nth % 400 === 200) addPause(log);
}

function addPause(log: Log): void {
	const pause = v4();
	log.add('pause-opened', { pause, reason: 'rest' });
	log.pass(60 * A_SECOND);
	log.add('pause-closed', { pause });
}

/** One trial in four is disturbed. */
function scoreOf(nth: number): Score {
	return nth % 4 === 3 ? ERRORS[(nth >> 2) % ERRORS.length]! : 'intact';
}

class Log {
	readonly entries: LogEvent[] = [];
	#now = BEGINS;

	pass(milliseconds: number): void {
		this.#now += milliseconds;
	}

	time(ahead = 0): string {
		return new Date(this.#now + ahead).toISOString();
	}

	add<T extends EventType>(type: T, data: EventData[T]): string {
		const id = v7({ msecs: this.#now });
		const at = this.time();
		this.entries.push({
			id,
			type,
			v: 1,
			at,
			device: 'examiner',
			monotonic: this.#now - BEGINS,
			data,
			position: this.entries.length + 1,
			receivedAt: at,
			sender: 'account',
			hash: '0'.repeat(64)
		} as unknown as LogEvent);
		return id;
	}
}
