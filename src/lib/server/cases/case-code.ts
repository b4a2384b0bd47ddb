import { randomInt } from 'node:crypto';

/** Letters that sound alike in most languages and spell no word in pairs of syllables. */
const CONSONANTS = 'bdfgklmnprstv';
const VOWELS = 'aiou';

/** A code that can be said aloud and carries no name: two words of two syllables and two digits, tamu-rilo-38. */
export function newCaseCode(random: (below: number) => number = randomInt): string {
	const letter = (letters: string) => letters.charAt(random(letters.length));
	const syllable = () => letter(CONSONANTS) + letter(VOWELS);
	const word = () => syllable() + syllable();
	return `${word()}-${word()}-${random(10)}${random(10)}`;
}
