/** Words of the parts that every page shares. */

export const APP_NAME = 'Wordkeep';

/** The title of a page as the browser shows it: "People, Wordkeep". */
export function pageTitle(title: string): string {
	return `${title}, ${APP_NAME}`;
}

export const DIALOG = { close: 'Close' };

export const COPY = { copy: 'Copy', copied: 'Copied' };

export const TABLE = {
	search: 'Search',
	pages: 'Pages of the list',
	previous: 'Previous',
	next: 'Next',
	page: (page: number, pages: number) => `Page ${page} of ${pages}`,
	count: (shown: number, all: number) => (shown === all ? `${all} in all` : `${shown} of ${all}`),
	nothingFound: (sought: string) => `Nothing here contains "${sought}". Search for less.`
};

export const NO_ANSWER = 'The server did not answer. What you typed is still here: check the connection and try again.';
