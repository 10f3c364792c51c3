export async function up(knex) {
  await knex.raw('UPDATE complaints c JOIN complaint_reports r ON r.complaint_id = c.id SET c.area = r.area');
  await knex.raw('ALTER TABLE complaint_reports DROP COLUMN area');
}

export async function down(knex) {
  await knex.raw('ALTER TABLE complaint_reports ADD COLUMN area VARCHAR(80) NULL');
  await knex.raw('UPDATE complaint_reports r JOIN complaints c ON c.id = r.complaint_id SET r.area = c.area');
}
