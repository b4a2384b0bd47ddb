import type { Knex } from 'knex';

/** The case log: appended to, never changed. `event` is the JSON as it came. */
export async function up(knex: Knex): Promise<void> {
	await knex.schema.createTable('case_log', (t) => {
		t.text('case_code').notNullable().references('code').inTable('cases').onDelete('RESTRICT');
		t.integer('position').notNullable();
		t.text('id').notNullable();
		t.text('received_at').notNullable();
		t.text('sender').notNullable();
		t.text('event').notNullable();
		t.text('hash').notNullable();
		t.primary(['case_code', 'position']);
		t.unique(['case_code', 'id']);
	});
	for (const action of ['UPDATE', 'DELETE']) {
		await knex.raw(
			`CREATE TRIGGER case_log_refuses_${action.toLowerCase()} BEFORE ${action} ON case_log
			 BEGIN SELECT RAISE(ABORT, 'the case log is appended to, never changed'); END`
		);
	}
}

export async function down(knex: Knex): Promise<void> {
	await knex.schema.dropTable('case_log');
}
