import type { Config } from 'tailwindcss';

/** The tokens of the look. Their values, per lighting, are CSS variables in src/app.css. */
export default {
	content: ['./src/**/*.{html,js,svelte,ts}'],
	theme: {
		extend: {
			colors: {
				ground: 'var(--ground)',
				panel: 'var(--panel)',
				edge: 'var(--edge)',
				ink: 'var(--ink)',
				mute: 'var(--mute)',
				ember: 'var(--ember)',
				frost: 'var(--frost)',
				leaf: 'var(--leaf)'
			},
			fontFamily: { sans: ['"Atkinson Hyperlegible"', 'sans-serif'] }
		}
	}
} satisfies Config;
