import { newCase } from '../api/entries';
import { firstAdministrator, newMember, startServer, type Member, type Server } from '../api/server';
import { build } from '../../src/cli/build.js';
import { PORTS } from './ports';

/** Wordkeep as it runs in production, on data of its own, with who is needed for a mapping. */
export interface Clinic {
	server: Server;
	examiner: Member;
	surgeon: Member;
	/** A new case with both on its team; its code. */
	newCase(): Promise<string>;
}

export async function openClinic(): Promise<Clinic> {
	await build();
	const server = await startServer({ port: PORTS.wordkeep });
	const administrator = await firstAdministrator(server);
	const examiner = await newMember(server, administrator, 'examiner', ['examiner', 'therapist']);
	const surgeon = await newMember(server, administrator, 'surgeon', ['surgeon']);
	return { server, examiner, surgeon, newCase: () => newCase(examiner, surgeon) };
}
