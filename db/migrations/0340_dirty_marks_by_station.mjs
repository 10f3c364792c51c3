export const up = (knex) =>
  knex.raw(
    `ALTER TABLE dirty_marks DROP PRIMARY KEY, ADD PRIMARY KEY (station_id, id), ADD KEY dirty_marks_id (id)`,
  );

export const down = (knex) =>
  knex.raw(`ALTER TABLE dirty_marks DROP PRIMARY KEY, ADD PRIMARY KEY (id), DROP KEY dirty_marks_id`);
