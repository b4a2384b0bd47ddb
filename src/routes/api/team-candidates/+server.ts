import { json } from '@sveltejs/kit';
import { teamCandidates } from '$lib/server/accounts/people';
import type { RequestHandler } from './$types';

export const GET: RequestHandler = async () => json({ people: await teamCandidates() });
