import type { TaskLanguage } from '$lib/mapping/events';

function isSame(a: TaskLanguage, b: TaskLanguage): boolean {
	return a.task === b.task && a.language === b.language;
}

export function isIn(list: readonly TaskLanguage[], pair: TaskLanguage): boolean {
	return list.some((other) => isSame(other, pair));
}

export function without(list: readonly TaskLanguage[], pair: TaskLanguage): TaskLanguage[] {
	return list.filter((other) => !isSame(other, pair));
}
