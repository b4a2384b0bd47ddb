import type { Knex } from 'knex';

/** Who may sign in. Times are RFC 3339 text in UTC; `expires_at` of a session is in seconds, as lucia counts. */
export async function up(knex: Knex): Promise<void> {
	await knex.schema.createTable('accounts', (t) => {
		t.text('id').primary();
		t.text('email').notNullable().unique();
		t.text('name').notNullable();
		t.text('roles').notNullable();
		t.text('password_hash');
		t.text('created_at').notNullable();
		t.text('disabled_at');
	});
	await knex.schema.createTable('sessions', (t) => {
		t.text('id').primary();
		t.text('account_id').notNullable().references('id').inTable('accounts').onDelete('RESTRICT').index();
		t.integer('expires_at').notNullable();
	});
	await knex.schema.createTable('invitations', (t) => {
		t.text('token_hash').primary();
		// null: the link that creates the first administrator
		t.text('account_id').references('id').inTable('accounts').onDelete('RESTRICT');
		t.text('created_at').notNullable();
		t.text('expires_at').notNullable();
		t.text('used_at');
	});
}

export async function down(knex: Knex): Promise<void> {
	await knex.schema.dropTable('invitations');
	await knex.schema.dropTable('sessions');
	await knex.schema.dropTable('accounts');
}
