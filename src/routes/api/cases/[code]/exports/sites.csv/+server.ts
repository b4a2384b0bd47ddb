import { fold } from '$lib/mapping/fold';
import { csvDownload } from '$lib/server/exports/download';
import { sitesCsv } from '$lib/server/exports/sites-csv';
import { logOf } from '$lib/server/log/log';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async ({ locals }) => {
	const { code } = locals.case;
	return csvDownload(code, 'sites', sitesCsv(code, fold(await logOf(code))));
};
