import { parse } from 'csv-parse/sync';
import { readFile, readdir } from 'node:fs/promises';
import { basename, join } from 'node:path';
import type { z } from 'zod';
import { COLUMNS, ITEM_FIELDS, itemSchema, packageSchema, type ItemSet, type SetItem } from './schema';

/** A set that cannot be used: every problem found, each naming its file, and in the table its row and column. */
export class ItemSetError extends Error {
	constructor(readonly problems: string[]) {
		super(problems.join('\n'));
		this.name = 'ItemSetError';
	}
}

async function readText(file: string): Promise<string> {
	const bytes = await readFile(file).catch((cause: NodeJS.ErrnoException) => {
		throw new ItemSetError([`${file}: cannot be read (${cause.code ?? cause.message})`]);
	});
	try {
		return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
	} catch {
		throw new ItemSetError([`${file}: is not UTF-8`]);
	}
}

function parseJson(file: string, text: string): unknown {
	try {
		return JSON.parse(text);
	} catch (cause) {
		throw new ItemSetError([`${file}: is not JSON (${(cause as Error).message})`]);
	}
}

async function readPackage(folder: string): Promise<z.infer<typeof packageSchema>> {
	const file = join(folder, 'datapackage.json');
	const parsed = packageSchema.safeParse(parseJson(file, await readText(file)));
	if (!parsed.success) {
		throw new ItemSetError(
			parsed.error.issues.map((issue) => `${file}, ${issue.path.join('.') || 'the whole'}: ${issue.message}`)
		);
	}
	const problems: string[] = [];
	if (parsed.data.name !== basename(folder))
		problems.push(`${file}, name: is "${parsed.data.name}", but the folder is "${basename(folder)}"`);
	const fields = parsed.data.resources[0].schema.fields.map(({ name, type }) => `${name} (${type})`);
	const expected = ITEM_FIELDS.map(({ name, type }) => `${name} (${type})`);
	if (fields.join() !== expected.join())
		problems.push(`${file}, resources.0.schema.fields: must be ${expected.join(', ')}`);
	if (problems.length > 0) throw new ItemSetError(problems);
	return parsed.data;
}

function parseTable(file: string, text: string): string[][] {
	try {
		return parse(text, { bom: true, relax_column_count: true });
	} catch (cause) {
		throw new ItemSetError([`${file}: is not a table by RFC 4180 (${(cause as Error).message})`]);
	}
}

async function readItems(folder: string, licences: string[]): Promise<SetItem[]> {
	const file = join(folder, 'items.csv');
	const [header = [], ...rows] = parseTable(file, await readText(file));
	if (header.join() !== COLUMNS.join())
		throw new ItemSetError([`${file}, row 1: the columns must be ${COLUMNS.join(',')}`]);
	if (rows.length === 0) throw new ItemSetError([`${file}: has no items`]);

	const problems: string[] = [];
	const items: SetItem[] = [];
	const rowOf = new Map<string, number>();
	rows.forEach((cells, index) => {
		// As a spreadsheet numbers them: the header is row 1.
		const row = index + 2;
		if (cells.length !== COLUMNS.length) {
			problems.push(`${file}, row ${row}: has ${cells.length} columns, not ${COLUMNS.length}`);
			return;
		}
		const record = Object.fromEntries(COLUMNS.map((column, at) => [column, cells[at] ?? '']));
		const parsed = itemSchema.safeParse(record);
		if (!parsed.success) {
			for (const issue of parsed.error.issues) {
				const column = String(issue.path[0]);
				const cell = record[column] ? ` "${record[column]}"` : '';
				problems.push(`${file}, row ${row}, column ${column}:${cell} ${issue.message}`);
			}
			return;
		}
		const item = parsed.data;
		const earlier = rowOf.get(item.id);
		if (earlier !== undefined)
			problems.push(`${file}, row ${row}, column id: "${item.id}" is in row ${earlier} already`);
		if (!licences.includes(item.licence))
			problems.push(
				`${file}, row ${row}, column licence: "${item.licence}" is not among the licenses of datapackage.json`
			);
		rowOf.set(item.id, row);
		items.push(item);
	});
	if (problems.length > 0) throw new ItemSetError(problems);
	return items;
}

/**
 * Reads one set's folder and checks it against the format.
 * @throws ItemSetError with every problem found
 */
export async function readSet(folder: string): Promise<ItemSet> {
	const described = await readPackage(folder);
	const licences = described.licenses;
	return {
		id: described.name,
		version: described.version,
		title: described.title,
		description: described.description,
		task: described.task,
		language: described.language,
		leadIn: described.leadIn,
		norms: described.norms,
		licences,
		items: await readItems(
			folder,
			licences.map(({ name }) => name)
		)
	};
}

/** The folders of the sets below `root`, by name. */
export async function listSetFolders(root: string): Promise<string[]> {
	const entries = await readdir(root, { withFileTypes: true });
	return entries
		.filter((entry) => entry.isDirectory())
		.map((entry) => join(root, entry.name))
		.sort();
}
