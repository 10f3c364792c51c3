import { closeDb } from './client';
import { migrateUp, NewerSchemaError } from './migrateUp';

try {
  const names = await migrateUp();
  console.log(names.length === 0 ? 'The schema is up to date.' : `Applied ${names.length} migrations.`);
} catch (error) {
  console.error(error instanceof NewerSchemaError ? error.message : error);
  process.exitCode = 1;
} finally {
  await closeDb();
}
