import { expect, test } from 'vitest';
import { db } from '#db/client';
import { alterKind } from '../../db/sharding/alterKind.mjs';
import { shardTables } from '#db/sharding/shardTables';
import { useFreshSchema } from '../integration/support/freshSchema';

useFreshSchema();

test('a migration alters a high-volume table in every bucket, and the head follows', async () => {
  await db()('station_locks').insert([{ station_id: 1 }, { station_id: 2 }]);
  const add = () => alterKind(db(), 'station_locks', 'ADD COLUMN since INT UNSIGNED NOT NULL DEFAULT 7');
  await add();
  // Broken off, it is called again.
  await add();
  await shardTables();
  await db()('station_locks').insert({ station_id: 3, since: 9 });
  const rows: unknown = await db()('station_locks').orderBy('station_id').select('station_id', 'since');
  expect(rows).toEqual([
    { station_id: 1, since: 7 },
    { station_id: 2, since: 7 },
    { station_id: 3, since: 9 },
  ]);
});
