import type { Knex } from 'knex';

/**
 * Patient views and the codes that pair them. `offered` waits for a device, `claimed` for the examiner's word;
 * one view of a case is `confirmed` at a time; `ended` is revoked, expired or replaced.
 */
export async function up(knex: Knex): Promise<void> {
	await knex.schema.createTable('patient_views', (t) => {
		t.text('id').primary();
		t.text('case_code').notNullable().references('code').inTable('cases').onDelete('RESTRICT').index();
		t.text('state').notNullable();
		t.text('code_hash').notNullable().index();
		t.text('token_hash').index();
		// the word both screens show, so that the examiner confirms the right device
		t.text('check_word');
		t.text('created_by').notNullable().references('id').inTable('accounts').onDelete('RESTRICT');
		t.text('created_at').notNullable();
		t.text('expires_at').notNullable();
	});
}

export async function down(knex: Knex): Promise<void> {
	await knex.schema.dropTable('patient_views');
}
