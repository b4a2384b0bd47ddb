import { z } from 'zod';
import type { DisplayCommand } from '$lib/stimuli/display';

const id = z.guid();
const picture = z.strictObject({
	kind: z.literal('picture'),
	files: z.array(z.strictObject({ file: z.string(), width: z.int().positive() })).min(1),
	attribution: z.string().optional()
});
const text = z.strictObject({ kind: z.literal('text'), text: z.string().max(2000) });
const sound = z.strictObject({ kind: z.literal('sound'), file: z.string(), duration: z.number().positive() });

const layout = z.strictObject({
	turn: z.literal([0, 1, 2, 3]),
	mirrored: z.boolean(),
	x: z.number().min(-1).max(1),
	y: z.number().min(-1).max(1),
	degrees: z.number().min(1).max(30),
	distance: z.number().min(100).max(3000)
});

/** What may be sent to a patient view. Any further field is refused, so that nothing else can reach it. */
export const displayCommand = z.discriminatedUnion('kind', [
	z.strictObject({
		id,
		kind: z.literal('show'),
		trial: id,
		showAt: z.number().positive(),
		duration: z.number().positive().nullable(),
		prompts: z.array(z.discriminatedUnion('kind', [picture, text, sound])).min(1)
	}),
	z.strictObject({ id, kind: z.literal('blank') }),
	z.strictObject({ id, kind: z.literal('layout'), layout }),
	z.strictObject({ id, kind: z.literal('prepare') }),
	z.strictObject({ id, kind: z.literal('identify'), text: z.string().max(20) })
]) satisfies z.ZodType<DisplayCommand>;
