import { closeDb, db } from './client';

const [, names] = (await db().migrate.latest()) as [number, string[]];
console.log(names.length === 0 ? 'The schema is up to date.' : `Applied ${names.length} migrations.`);
await closeDb();
