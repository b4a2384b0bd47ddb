import { buildMedia } from '../lib/server/media/build-media';

/** `npm run media`: builds the pictures and sounds of the item sets into .media. */
try {
	await buildMedia('stimuli', '.media', ({ set, drawn, rendered }) => {
		const made = [drawn > 0 ? `${drawn} pictures drawn` : '', rendered > 0 ? `${rendered} sounds rendered` : ''];
		const what = made.filter((part) => part !== '').join(', ') || 'unchanged';
		console.log(`${set.id} ${set.version}: ${set.items.length} items, ${what}`);
	});
} catch (error) {
	console.error(error instanceof Error ? error.message : error);
	process.exitCode = 1;
}
