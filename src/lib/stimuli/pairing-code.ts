const LENGTH = 8;

/** What somebody typed, as it was printed: any case, O for 0, I and L for 1, with or without the dash. */
export function normalCode(code: string): string {
	return code
		.toUpperCase()
		.replace(/[^0-9A-Z]/g, '')
		.replaceAll('O', '0')
		.replace(/[IL]/g, '1');
}

/** A code in the form it is shown in, ABCD-EFGH; null while it has not its eight letters. */
export function readCode(text: string): string | null {
	const code = normalCode(text);
	return code.length === LENGTH ? `${code.slice(0, 4)}-${code.slice(4)}` : null;
}
