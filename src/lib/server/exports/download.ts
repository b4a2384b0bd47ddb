/** A table to keep as a file, named by the code of its case. */
export function csvDownload(code: string, name: string, csv: string): Response {
	return new Response(csv, {
		headers: {
			'content-type': 'text/csv; charset=utf-8',
			'content-disposition': `attachment; filename="${code}-${name}.csv"`,
			'cache-control': 'no-store'
		}
	});
}
