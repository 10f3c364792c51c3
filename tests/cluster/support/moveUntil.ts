import { createRequire } from 'node:module';
import { dataServers } from '#db/sharding/dataServers';
import { moveBucket } from '#ops/cluster/moveBucket';

/**
 * Moves a bucket in a process that kills itself without warning just before a statement. Arguments: the bucket, the server, a pattern of the
 * statement, and how many that match are let through before.
 */
const [bucket = '', server = '', pattern = '', letThrough = ''] = process.argv.slice(2);
const { Connection } = createRequire(import.meta.url)('mysql2') as {
  Connection: { prototype: { query: (asked: string | { sql: string }, ...rest: unknown[]) => unknown } };
};
const { query } = Connection.prototype;
let matches = 0;
Connection.prototype.query = function killAt(asked, ...rest) {
  const sql = typeof asked === 'string' ? asked : asked.sql;
  if (new RegExp(pattern).test(sql) && matches++ === Number(letThrough)) process.kill(process.pid, 'SIGKILL');
  return query.call(this, asked, ...rest);
};
const to = dataServers().find(({ name }) => name === server);
if (!to) throw new Error(`There is no data server ${server}.`);
await moveBucket(Number(bucket), to);
process.exit();
