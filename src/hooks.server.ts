import {
	error,
	json,
	redirect,
	type Handle,
	type HandleServerError,
	type RequestEvent,
	type ServerInit
} from '@sveltejs/kit';
import { sequence } from '@sveltejs/kit/hooks';
import { randomUUID } from 'node:crypto';
import { REFUSALS } from '$lib/messages/refusals';
import { offerSetUp } from '$lib/server/accounts/invitations';
import { readSession } from '$lib/server/accounts/sessions';
import { caseByCode } from '$lib/server/cases/cases';
import { db, openDatabase } from '$lib/server/database';
import { demo } from '$lib/server/demo/seed';
import { readPatientToken } from '$lib/server/live/patient-cookie';
import { patientViewByToken } from '$lib/server/live/patient-views';
import { decide, PERMISSIONS, type Decision, type Method } from '$lib/server/permissions';

export const init: ServerInit = async () => {
	await openDatabase();
	// The port that src/cli/serve.js listens on; the development server has its own.
	const port = process.env.PORT ?? '5173';
	if (process.env.WORDKEEP_DEMO) console.log(await demo(port));
	const token = await offerSetUp();
	if (token) console.log(`Make the first administrator, once: http://localhost:${port}/set-up/${token}`);
};

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Headers that isolate the pages from others and let them measure time finely. */
const secureHeaders: Handle = async ({ event, resolve }) => {
	const response = await resolve(event);
	for (const [name, value] of Object.entries({
		'cross-origin-opener-policy': 'same-origin',
		'cross-origin-embedder-policy': 'require-corp',
		'cross-origin-resource-policy': 'same-origin',
		'x-content-type-options': 'nosniff',
		'x-frame-options': 'DENY',
		'referrer-policy': 'same-origin',
		'permissions-policy': 'camera=(), geolocation=(), payment=(), usb=()'
	})) {
		response.headers.set(name, value);
	}
	return response;
};

/** An unsafe request from another origin is a page that acts for somebody; one without Origin is a program. */
const sameOrigin: Handle = async ({ event, resolve }) => {
	const origin = event.request.headers.get('origin');
	if (!SAFE.has(event.request.method) && origin !== null && origin !== event.url.origin) {
		return json({ error: REFUSALS.otherSite }, { status: 403 });
	}
	return await resolve(event);
};

const identify: Handle = async ({ event, resolve }) => {
	const { account, session } = await readSession(event.cookies, event.url);
	event.locals.account = account;
	event.locals.session = session;
	event.locals.patientView = null;
	if (event.route.id?.startsWith('/api/patient/')) {
		const token = readPatientToken(event.cookies, event.url);
		event.locals.patientView = token ? await patientViewByToken(token) : null;
	}
	return await resolve(event);
};

const permit: Handle = async ({ event, resolve }) => {
	const route = event.route.id;
	if (route === null) return await resolve(event);
	const method = (event.request.method === 'HEAD' ? 'GET' : event.request.method) as Method;
	const access = PERMISSIONS[route]?.[method];
	const { account, patientView } = event.locals;
	const confirmed = patientView?.state === 'confirmed' ? patientView : null;
	const found = access?.case && account && event.params.code ? await caseByCode(event.params.code) : undefined;
	if (found) event.locals.case = found;
	const decision = decide(access, account, confirmed, found);
	return decision === 'allowed' ? await resolve(event) : refuse(event, decision);
};

const ANSWERS: Record<Exclude<Decision, 'allowed'>, { status: number; reason: string }> = {
	'sign-in-first': { status: 401, reason: REFUSALS.signInFirst },
	forbidden: { status: 403, reason: REFUSALS.roleForbids },
	'not-found': { status: 404, reason: REFUSALS.noCase }
};

function refuse(event: RequestEvent, decision: Exclude<Decision, 'allowed'>): Response {
	const isPage = !event.route.id?.startsWith('/api/');
	if (isPage && decision === 'sign-in-first') {
		redirect(303, `/sign-in?to=${encodeURIComponent(event.url.pathname + event.url.search)}`);
	}
	const { status, reason } = ANSWERS[decision];
	if (isPage) error(status, reason);
	return json({ error: reason }, { status });
}

export const handle = sequence(secureHeaders, sameOrigin, identify, permit);

/** The whole failure goes to the server's own log under an id; who asked gets the id. */
export const handleError: HandleServerError = ({ error, event, status, message }) => {
	if (status === 404) return { message };
	const id = randomUUID();
	console.error(JSON.stringify({ at: new Date().toISOString(), id, route: event.route.id, status }), error);
	return { message: REFUSALS.failure, id };
};

// The adapter stops listening but leaves the process to end by itself: close what keeps it alive.
process.on('sveltekit:shutdown', () => {
	void db.destroy();
});
