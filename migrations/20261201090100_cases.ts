import type { Knex } from 'knex';

/** A case holds no name, no birth date and no record number: a code and what the operation is. */
export async function up(knex: Knex): Promise<void> {
	await knex.schema.createTable('cases', (t) => {
		t.text('code').primary();
		t.text('hemisphere').notNullable();
		t.text('languages').notNullable();
		t.text('planned_on');
		t.text('note').notNullable().defaultTo('');
		t.text('created_at').notNullable();
		t.text('created_by').notNullable().references('id').inTable('accounts').onDelete('RESTRICT');
	});
	await knex.schema.createTable('case_team', (t) => {
		t.text('case_code').notNullable().references('code').inTable('cases').onDelete('RESTRICT');
		t.text('account_id').notNullable().references('id').inTable('accounts').onDelete('RESTRICT').index();
		t.primary(['case_code', 'account_id']);
	});
}

export async function down(knex: Knex): Promise<void> {
	await knex.schema.dropTable('case_team');
	await knex.schema.dropTable('cases');
}
