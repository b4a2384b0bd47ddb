import { fold } from '$lib/mapping/fold';
import { csvDownload } from '$lib/server/exports/download';
import { trialsCsv } from '$lib/server/exports/trials-csv';
import { logOf } from '$lib/server/log/log';
import { readSettings } from '$lib/server/settings';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals }) => {
	const { code } = locals.case;
	const { zone } = await readSettings();
	return csvDownload(code, 'trials', trialsCsv(code, fold(await logOf(code)), zone));
};
