import type { Knex } from 'knex';
import type { Hemisphere } from '$lib/mapping/vocabulary';
import type { Account } from '../accounts/accounts';
import type { Role } from '../accounts/roles';
import { db, prepared, withConnection } from '../database';
import type { AccountRow, CaseRow } from '../tables';
import { newCaseCode } from './case-code';

/** Somebody on the team of a case. */
export interface TeamMember {
	id: string;
	name: string;
	roles: Role[];
}

/** One operation. What happened in it is in its log. */
export interface Case {
	code: string;
	hemisphere: Hemisphere;
	/** BCP 47 */
	languages: string[];
	/** a date, or null */
	plannedOn: string | null;
	note: string;
	createdAt: string;
	team: TeamMember[];
}

export interface NewCase {
	hemisphere: Hemisphere;
	languages: string[];
	team: string[];
	plannedOn?: string | null;
	note?: string;
}

/** An account on a team that does not exist. */
export class UnknownAccount extends Error {
	constructor(readonly id: string) {
		super(`no account ${id}`);
	}
}

/**
 * Makes a case under a new code; its creator joins the team.
 *
 * @throws UnknownAccount, with nothing made
 */
export async function createCase(given: NewCase, creator: Account): Promise<Case> {
	const code = await db.transaction(async (trx) => {
		const row: CaseRow = {
			code: await unusedCode(trx),
			hemisphere: given.hemisphere,
			languages: JSON.stringify(given.languages),
			planned_on: given.plannedOn ?? null,
			note: given.note ?? '',
			created_at: new Date().toISOString(),
			created_by: creator.id
		};
		await trx<CaseRow>('cases').insert(row);
		await writeTeam(trx, row.code, [creator.id, ...given.team]);
		return row.code;
	});
	return (await caseByCode(code))!;
}

async function unusedCode(trx: Knex.Transaction): Promise<string> {
	for (;;) {
		const code = newCaseCode();
		if (!(await trx<CaseRow>('cases').where({ code }).first())) return code;
	}
}

/** @throws UnknownAccount */
async function writeTeam(trx: Knex.Transaction, code: string, accounts: string[]): Promise<void> {
	const team = [...new Set(accounts)];
	const known = new Set(await trx<AccountRow>('accounts').whereIn('id', team).pluck('id'));
	const unknown = team.find((id) => !known.has(id));
	if (unknown !== undefined) throw new UnknownAccount(unknown);
	await trx('case_team').where({ case_code: code }).delete();
	if (team.length > 0) await trx('case_team').insert(team.map((id) => ({ case_code: code, account_id: id })));
}

/**
 * Sets who is on the team of a case.
 *
 * @throws UnknownAccount, with the team as it was
 */
export async function setTeam(code: string, accounts: string[]): Promise<void> {
	await db.transaction(async (trx) => await writeTeam(trx, code, accounts));
}

/** Changes what a case says of its operation; the log is not touched. */
export async function changeCase(
	code: string,
	change: Partial<Pick<Case, 'hemisphere' | 'languages' | 'plannedOn' | 'note'>>
): Promise<void> {
	const row: Partial<CaseRow> = {};
	if (change.hemisphere !== undefined) row.hemisphere = change.hemisphere;
	if (change.languages !== undefined) row.languages = JSON.stringify(change.languages);
	if (change.plannedOn !== undefined) row.planned_on = change.plannedOn;
	if (change.note !== undefined) row.note = change.note;
	if (Object.keys(row).length > 0) await db<CaseRow>('cases').where({ code }).update(row);
}

const CASE = 'SELECT * FROM cases WHERE code = ?';
const TEAMS = `SELECT case_team.case_code, accounts.id, accounts.name, accounts.roles FROM case_team
	JOIN accounts ON accounts.id = case_team.account_id`;
const TEAM = `${TEAMS} WHERE case_team.case_code = ? ORDER BY accounts.name`;

/** Asked by every request about a case. */
export async function caseByCode(code: string): Promise<Case | null> {
	return await withConnection((connection) => {
		const row = prepared<[string], CaseRow>(connection, CASE).get(code);
		return row ? toCase(row, teamsIn(prepared<[string], TeamRow>(connection, TEAM).all(code))) : null;
	});
}

/** Every case, the newest first. */
export async function listCases(): Promise<Case[]> {
	const rows = await db<CaseRow>('cases').orderBy('created_at', 'desc');
	const teams = teamsIn(await db.raw<TeamRow[]>(`${TEAMS} ORDER BY accounts.name`));
	return rows.map((row) => toCase(row, teams));
}

export function isOnTeam(found: Case, account: Pick<Account, 'id'>): boolean {
	return found.team.some((member) => member.id === account.id);
}

type TeamRow = Pick<AccountRow, 'id' | 'name' | 'roles'> & { case_code: string };

function teamsIn(rows: TeamRow[]): Map<string, TeamMember[]> {
	const teams = new Map<string, TeamMember[]>();
	for (const { case_code, id, name, roles } of rows) {
		const team = teams.get(case_code) ?? [];
		teams.set(case_code, team);
		team.push({ id, name, roles: JSON.parse(roles) as Role[] });
	}
	return teams;
}

function toCase(row: CaseRow, teams: Map<string, TeamMember[]>): Case {
	return {
		code: row.code,
		hemisphere: row.hemisphere as Hemisphere,
		languages: JSON.parse(row.languages) as string[],
		plannedOn: row.planned_on,
		note: row.note,
		createdAt: row.created_at,
		team: teams.get(row.code) ?? []
	};
}
