import { z } from 'zod';
import { HEMISPHERES } from '$lib/mapping/vocabulary';
import { languageTag } from '../log/event-schema';

/** What may be said of a case; no name, no birth date, no record number is asked for. */
export const caseFields = {
	hemisphere: z.enum(HEMISPHERES),
	languages: z.array(languageTag).min(1).max(10),
	plannedOn: z.iso.date().nullable(),
	note: z.string().max(2000)
};
