import { hash, verify } from '@node-rs/argon2';

/** argon2id as the OWASP password storage cheat sheet sets it: 19 MiB, two passes, one lane. */
const OPTIONS = { memoryCost: 19456, timeCost: 2, outputLen: 32, parallelism: 1 };

/** Shortest password of an account without a second factor: NIST SP 800-63B-4, section 3.1.1.2. */
export const MIN_PASSWORD_LENGTH = 15;
/** Longest one that is taken, so that nobody makes the server hash a book; the same section asks for 64 at least. */
export const MAX_PASSWORD_LENGTH = 1024;

/** What keeps a password from being taken; every code point counts as one character. */
export function passwordFault(password: string): 'short' | 'long' | null {
	const length = [...normal(password)].length;
	if (length < MIN_PASSWORD_LENGTH) return 'short';
	return length > MAX_PASSWORD_LENGTH ? 'long' : null;
}

/** Two keyboards may write one letter differently: NFKC, as the same section advises. */
function normal(password: string): string {
	return password.normalize('NFKC');
}

export async function hashPassword(password: string): Promise<string> {
	return await hash(normal(password), OPTIONS);
}

let nobody: Promise<string> | undefined;

/**
 * Compares a password with a hash. Without a hash it does the same work and says no, so that the time taken does
 * not tell whether an account exists.
 */
export async function verifyPassword(passwordHash: string | null, password: string): Promise<boolean> {
	nobody ??= hashPassword('nobody has this password');
	const matches = await verify(passwordHash ?? (await nobody), normal(password));
	return passwordHash !== null && matches;
}
