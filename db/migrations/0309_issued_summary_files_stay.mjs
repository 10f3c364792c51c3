/** What is issued stays as it is: whatever would change or delete it is refused by the database itself. */
export const up = async (knex) => {
  for (const act of ['UPDATE', 'DELETE']) {
    await knex.raw(
      `CREATE OR REPLACE TRIGGER issued_summary_files_${act.toLowerCase()} BEFORE ${act} ON issued_summary_files FOR EACH ROW
       SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'What is issued is never changed'`,
    );
  }
};

export const down = async (knex) => {
  for (const act of ['update', 'delete']) await knex.raw(`DROP TRIGGER issued_summary_files_${act}`);
};
