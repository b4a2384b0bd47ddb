/** The core of howler alone, without its spatial plug-in. */
declare module 'howler/dist/howler.core.min.js' {
	export { Howler } from 'howler';
}
