import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

/** A route as the file tree has it. */
export interface Route {
	/** the framework's route id, such as `/(team)/cases/[code]` */
	id: string;
	method: string;
	isPage: boolean;
}

const ROOT = 'src/routes';
const PAGE = /^\+page(@[^.]*)?\.(svelte|ts|server\.ts)$/;
const EXPORTED = /export\s+(?:const|async\s+function|function)\s+(GET|POST|PUT|PATCH|DELETE|fallback)\b/g;
const ACTIONS = /export\s+const\s+actions\b/;

/** Every route and method that the build serves, read from the names and texts of the files. */
export function routesInTree(): Route[] {
	const found = new Map<string, Route>();
	for (const path of readdirSync(ROOT, { recursive: true, encoding: 'utf8' })) {
		const name = path.slice(path.lastIndexOf('/') + 1);
		const folder = dirname(path);
		for (const { method, isPage } of served(name, join(ROOT, path))) {
			const id = folder === '.' ? '/' : `/${folder}`;
			found.set(`${method} ${id}`, { id, method, isPage });
		}
	}
	return [...found.values()].sort((a, b) => a.id.localeCompare(b.id));
}

function served(name: string, path: string): { method: string; isPage: boolean }[] {
	if (PAGE.test(name)) {
		const acts = name.endsWith('.server.ts') && ACTIONS.test(readFileSync(path, 'utf8'));
		return (acts ? ['GET', 'POST'] : ['GET']).map((method) => ({ method, isPage: true }));
	}
	if (name !== '+server.ts') return [];
	const methods = [...readFileSync(path, 'utf8').matchAll(EXPORTED)].map(([, method]) => method!);
	if (methods.length === 0) throw new Error(`${path} exports no method in a form that this test can read`);
	return methods.map((method) => ({ method, isPage: false }));
}

const PARAMETERS: Record<string, string> = {
	token: 'a-token-that-nobody-has',
	id: '00000000-0000-4000-8000-000000000000',
	set: 'no-such-set',
	file: 'no-such-file.webp'
};

/** The address of a route. Throws for a parameter that it knows no value for. */
export function addressOf(id: string, code: string): string {
	const path = id.replace(/\/\([^)]+\)/g, '').replace(/\[+(?:\.\.\.)?(\w+)(?:=\w+)?\]+/g, (_, name: string) => {
		const value = name === 'code' ? code : PARAMETERS[name];
		if (value === undefined) throw new Error(`no value for [${name}] of ${id}`);
		return value;
	});
	return path === '' ? '/' : path;
}
