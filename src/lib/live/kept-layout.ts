import { DEFAULT_LAYOUT, type Layout } from '$lib/stimuli/display';

const KEY = 'wordkeep-layout';

/** How items lie on this device's screen, as it was set last. */
export function keptLayout(): Layout {
	const stored = localStorage.getItem(KEY);
	return { ...DEFAULT_LAYOUT, ...(stored ? (JSON.parse(stored) as Partial<Layout>) : {}) };
}

export function keepLayout(layout: Layout): void {
	localStorage.setItem(KEY, JSON.stringify(layout));
}
