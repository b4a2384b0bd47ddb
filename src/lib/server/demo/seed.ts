import { randomBytes } from 'node:crypto';
import { createAccount, listAccounts, setPassword, type Account } from '../accounts/accounts';
import { hashPassword } from '../accounts/passwords';
import { createCase, listCases } from '../cases/cases';
import { db } from '../database';
import { findSet } from '../library';
import { addressesFor } from '../live/addresses';
import { offerPatientView } from '../live/patient-views';
import { append } from '../log/log';
import { finishedLog, preparedLog } from './demo-log';
import { FINISHED, PEOPLE, PREPARED } from './scenario';

const DOMAIN = 'demo.invalid';

function addressOf(role: string): string {
	return `${role}@${DOMAIN}`;
}

/** Fills an empty installation with the invented scenario, once, and says how to walk in. */
export async function demo(port: string): Promise<string> {
	const password = await demoPassword();
	const accounts = await ensureAccounts(password);
	const { prepared, finished } = await ensureCases(accounts);
	const examiner = accounts.get('examiner')!;
	const { pairingCode } = await offerPatientView(prepared, examiner.id);
	const [reached = '', ...local] = addressesFor(new URL(`http://localhost:${port}`));
	const here = local.at(-1) ?? reached;
	return [
		'',
		'This is the demo. Its people and cases are invented; nothing in it happened.',
		'',
		`  Address     ${here}`,
		`  Accounts    ${PEOPLE.map(({ role }) => addressOf(role)).join('\n              ')}`,
		`  Password    ${password}`,
		`  Cases       ${prepared} (prepared), ${finished} (finished)`,
		'',
		'  For a first trial on one computer:',
		`  1. Sign in as ${addressOf('examiner')} and open ${here}/cases/${prepared}/examiner`,
		`  2. Open the patient view in a second window: ${here}/patient#${pairingCode}`,
		`     (from a tablet: ${reached}/patient#${pairingCode}; the link works once, within ten minutes)`,
		'  3. Confirm it in the first window, touch the second one once, type a tag, press Space, then Enter.',
		''
	].join('\n');
}

/** The one from DEMO_PASSWORD, or one that was made at the first start and is told again at each. */
async function demoPassword(): Promise<string> {
	if (process.env.DEMO_PASSWORD) return process.env.DEMO_PASSWORD;
	const row = await db<{ name: string; value: string }>('settings').where({ name: 'demo-password' }).first();
	if (row) return JSON.parse(row.value) as string;
	const password = randomBytes(12).toString('base64url');
	await db('settings').insert({ name: 'demo-password', value: JSON.stringify(password) });
	return password;
}

async function ensureAccounts(password: string): Promise<Map<string, Account>> {
	const known = new Map((await listAccounts()).map((account) => [account.email, account]));
	const hash = await hashPassword(password);
	const accounts = new Map<string, Account>();
	for (const { name, role } of PEOPLE) {
		const email = addressOf(role);
		const account = known.get(email) ?? (await createAccount({ name, email, roles: [role] }));
		if (!account) throw new Error(`no account for ${email}`);
		await setPassword(account.id, hash);
		accounts.set(role, account);
	}
	return accounts;
}

async function ensureCases(accounts: Map<string, Account>): Promise<{ prepared: string; finished: string }> {
	const existing = (await listCases()).toReversed();
	const [finished, prepared] = existing;
	if (finished && prepared) return { prepared: prepared.code, finished: finished.code };
	const team = [...accounts].filter(([role]) => role !== 'administrator').map(([, { id }]) => id);
	return {
		finished: await makeCase(FINISHED, team, accounts, finishedLog),
		prepared: await makeCase(PREPARED, team, accounts, preparedLog)
	};
}

async function makeCase(
	plan: typeof FINISHED | typeof PREPARED,
	team: string[],
	accounts: Map<string, Account>,
	log: typeof finishedLog
): Promise<string> {
	const { hemisphere, languages, plannedOn, note } = plan;
	const examiner = accounts.get('examiner')!;
	const { code } = await createCase({ hemisphere, languages, plannedOn, note, team }, examiner);
	const sets = await Promise.all(plan.sets.map(async (id) => await setNamed(id)));
	await append(code, examiner.id, log(sets));
	return code;
}

async function setNamed(id: string) {
	const set = await findSet(id);
	if (!set) throw new RangeError(`no item set ${id}`);
	return set;
}
