import type { Knex } from 'knex';

/** Settings of the whole installation, one JSON value a name: the clinic's time zone, for one. */
export async function up(knex: Knex): Promise<void> {
	await knex.schema.createTable('settings', (t) => {
		t.text('name').primary();
		t.text('value').notNullable();
	});
}

export async function down(knex: Knex): Promise<void> {
	await knex.schema.dropTable('settings');
}
