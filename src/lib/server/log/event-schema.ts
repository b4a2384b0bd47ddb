import { z } from 'zod';
import { EFFECTS, ERROR_KINDS, PURPOSES, SCORES, TAG_KINDS, TAG_PATTERN } from '../../mapping/vocabulary';
import type { EventData, EventType } from '../../mapping/events';
import { malformedIn } from './well-formed';

/** What the log accepts: every released type and version, each with all of its fields. Unknown ones are refused. */

const uuid = z.guid();
/** RFC 3339: ISO 8601 with seconds and an offset. */
const instant = z.iso.datetime({ offset: true }).regex(/T\d{2}:\d{2}:\d{2}/, 'a time has seconds and an offset');
const tag = z.string().regex(TAG_PATTERN, 'a tag is one to three digits or capital letters and does not begin with 0');
const word = z
	.string()
	.regex(/^[a-z][a-z0-9]*(-[a-z0-9]+)*$/, 'in kebab case')
	.max(60);
export const languageTag = z
	.string()
	.regex(/^[A-Za-z]{2,3}(-[A-Za-z0-9]{2,8})*$/, 'a language is a BCP 47 tag such as en or de-AT')
	.max(35);
const text = z.string().max(2000);
const name = z.string().min(1).max(200);
const milliamps = z.number().min(0).max(100);
const score = z.enum(SCORES);
const effect = z.enum(EFFECTS);
const taskLanguage = z.strictObject({ task: word, language: languageTag });

const rule = z.strictObject({
	minTrials: z.int().min(1).max(20),
	share: z
		.tuple([z.int().min(1).max(100), z.int().min(1).max(100)])
		.refine(([part, whole]) => part <= whole, 'a share is a part of a whole')
});

const prompt = z.discriminatedUnion('kind', [
	z.strictObject({
		kind: z.literal('picture'),
		files: z.array(z.strictObject({ file: name, width: z.int().positive() })).min(1),
		attribution: text.optional()
	}),
	z.strictObject({ kind: z.literal('text'), text }),
	z.strictObject({ kind: z.literal('sound'), file: name, duration: z.number().positive() })
]);

const caseItem = z.strictObject({
	id: name,
	answer: name,
	accepted: z.array(name),
	prompts: z.array(prompt).min(1),
	category: name.optional()
});

const stimulatedHasTag = {
	check: (data: { stimulated?: boolean; tag?: string | null }) => !(data.stimulated === true && data.tag === null),
	message: 'a stimulated trial has a tag'
};

/** What a protocol says, field by field; an entry gives those it changes. */
export const protocolFields = {
	rule,
	effects: z.partialRecord(score, z.strictObject({ language: effect.optional(), 'speech-motor': effect.optional() })),
	later: z.enum(['excluded', 'counted']),
	required: z.array(taskLanguage).max(50),
	kinds: z.array(z.enum(ERROR_KINDS)),
	timing: z.strictObject({
		shown: z.number().positive().max(600_000).nullable(),
		pause: z.number().min(0).max(600_000),
		lead: z.number().min(0).max(2000)
	})
};

const schemas = {
	'tag-placed': z.strictObject({ tag, kind: z.enum(TAG_KINDS).optional() }),
	'tag-removed': z.strictObject({ tag }),
	'protocol-set': z.strictObject(protocolFields).partial(),
	'stimulation-settings': z.strictObject({
		technique: name,
		frequency: z.number().positive().max(1000),
		pulseWidth: z.number().positive().max(10),
		probe: name,
		train: z.number().positive().max(60).optional(),
		note: text.optional()
	}),
	'run-opened': z.strictObject({ run: uuid, purpose: z.enum(PURPOSES), lead: name.optional() }),
	'run-closed': z.strictObject({ run: uuid }),
	'trial-presented': z
		.strictObject({
			trial: uuid,
			item: name.nullable(),
			task: word,
			language: languageTag,
			tag: tag.nullable(),
			stimulated: z.boolean(),
			milliamps: milliamps.nullable(),
			run: uuid.optional(),
			technique: name.optional(),
			showAt: instant.optional()
		})
		.refine(stimulatedHasTag.check, stimulatedHasTag.message),
	'trial-onset': z.strictObject({
		trial: uuid,
		shown: z.boolean(),
		planned: instant.optional(),
		measured: instant.optional(),
		source: z.enum(['presentation-time', 'paint-time', 'animation-frame', 'audio-clock', 'examiner']).optional(),
		reason: text.optional()
	}),
	'trial-scored': z.strictObject({
		trial: uuid,
		score,
		also: z.array(score).max(10).optional(),
		when: z.enum(['during', 'within-4s', 'later']).optional(),
		movement: z
			.strictObject({ tongue: z.enum(['kept', 'lost']).optional(), hand: z.enum(['kept', 'lost']).optional() })
			.optional(),
		said: text.optional(),
		note: text.optional(),
		corrects: z.array(uuid).max(100)
	}),
	'trial-corrected': z
		.strictObject({
			trial: uuid,
			tag: tag.nullable().optional(),
			stimulated: z.boolean().optional(),
			milliamps: milliamps.nullable().optional(),
			item: name.nullable().optional(),
			task: word.optional(),
			language: languageTag.optional()
		})
		.refine(stimulatedHasTag.check, stimulatedHasTag.message),
	'trial-excluded': z.strictObject({ trial: uuid, reason: name }),
	'entry-withdrawn': z.strictObject({ entry: uuid, reason: text.optional() }),
	'pause-opened': z.strictObject({ pause: uuid, reason: name }),
	'pause-closed': z.strictObject({ pause: uuid }),
	'stimulation-started': z.strictObject({
		stimulation: uuid,
		trial: uuid.optional(),
		tag: tag.nullable(),
		milliamps: milliamps.nullable(),
		source: name
	}),
	'stimulation-ended': z.strictObject({ stimulation: uuid }),
	'items-copied': z.strictObject({
		set: name,
		version: name,
		task: word,
		language: languageTag,
		leadIn: name.nullable(),
		items: z.array(caseItem).min(1).max(400)
	}),
	'item-decided': z.strictObject({
		item: name,
		task: word,
		language: languageTag,
		keep: z.boolean(),
		reason: text.optional()
	})
} satisfies { [T in EventType]: z.ZodType<EventData[T]> };

function eventOf<T extends EventType>(type: T, data: (typeof schemas)[T]) {
	return z.strictObject({
		id: uuid.refine((id) => id[14] === '7', 'an id is a UUID of version 7'),
		type: z.literal(type),
		v: z.literal(1, 'this version is not known here').optional(),
		at: instant,
		device: name,
		monotonic: z.number().min(0),
		data,
		by: name.optional(),
		clock: instant.optional(),
		uncertainty: z.number().min(0).optional(),
		boot: uuid.optional()
	});
}

const events = new Map<string, z.ZodType>(
	Object.entries(schemas).map(([type, data]) => [type, eventOf(type as EventType, data as never)])
);

/** What is wrong with an event, in one sentence that names the field; null when nothing is. */
export function faultOf(event: unknown): string | null {
	const type = z.looseObject({ type: z.string() }).safeParse(event);
	if (!type.success) return 'an entry is an object with a type';
	const schema = events.get(type.data.type);
	if (!schema) return `unknown type: ${type.data.type}`;
	const parsed = schema.safeParse(event);
	if (parsed.success) return malformedIn(event);
	return parsed.error.issues
		.map(({ path, message }) => (path.length ? `${path.join('.')}: ${message}` : message))
		.join('; ');
}
