import { BUCKETS, bucketTable, type Kind } from './kinds';

/** From here on a table's definition says how it is parted. */
const PARTITIONS = /\s*\n?\s*(\/\*!\d+\s*)?\n?\s*PARTITION BY [\s\S]*$/;
const COUNTED = / AUTO_INCREMENT=\d+/;
const CONSTRAINT = /,\n\s*CONSTRAINT [^\n]*?(?=,?\n)/g;

/** The statement that makes the table of a bucket like a table whose `SHOW CREATE TABLE` is given: with its keys and partitions, without foreign keys. */
export function bucketTableText(created: string, kind: Kind, bucket: number): string {
  return created
    .replace(COUNTED, '')
    .replace(CONSTRAINT, '')
    .replace(/^CREATE TABLE `\w+`/, `CREATE TABLE IF NOT EXISTS \`${bucketTable(kind, bucket)}\``);
}

/** The statement that makes one table of a kind for all stations, from a bucket's table as `SHOW CREATE TABLE` gives it. */
export function localTableText(created: string, kind: Kind): string {
  return created.replace(COUNTED, '').replace(/^CREATE TABLE `\w+`/, `CREATE TABLE \`${kind}\``);
}

/** What a bucket's part of a link table is called. */
export function linkPartition(bucket: number): string {
  return `b${String(bucket).padStart(2, '0')}`;
}

/**
 * The statement that makes the table of the head which leads to all buckets of a kind.
 * @param serverOf the name, as the head knows it, of the server that a bucket stands on.
 * @param tlsCaFile the file on the head's nodes that vouches for the data servers' certificates; null: they are reached without TLS.
 */
export function linkTableText(
  created: string,
  kind: Kind,
  name: string,
  serverOf: (bucket: number) => string,
  tlsCaFile: string | null = null,
): string {
  const partitions = Array.from(
    { length: BUCKETS },
    (_, bucket) =>
      `PARTITION ${linkPartition(bucket)} VALUES IN (${bucket})
       COMMENT = 'srv "${serverOf(bucket)}", tbl "${bucketTable(kind, bucket)}"' ENGINE = SPIDER`,
  );
  // Ids are counted by each bucket's table.
  const counting = /AUTO_INCREMENT/.test(created.replace(COUNTED, '')) ? ', auto_increment_mode "3"' : '';
  const protectedBy = tlsCaFile === null ? '' : `, ssl_ca "${tlsCaFile}", ssl_verify_server_cert "1"`;
  const columns = created
    .replace(PARTITIONS, '')
    .replace(COUNTED, '')
    .replace(CONSTRAINT, '')
    .replace(/^CREATE TABLE `\w+`/, `CREATE TABLE \`${name}\``)
    .replace(/ENGINE=\w+/, 'ENGINE=SPIDER')
    .replace(/ COMMENT='(?:[^']|'')*'\s*$/, '');
  return `${columns} COMMENT='wrapper "mysql"${counting}${protectedBy}' PARTITION BY LIST (station_id MOD ${BUCKETS}) (${partitions.join(',\n')})`;
}

/** Whether a table's definition is one that leads to buckets. */
export function isLinkTable(created: string): boolean {
  return /ENGINE ?= ?SPIDER/i.test(created);
}

/** The file that vouches for the data servers of a link table; null where it reaches them without TLS. */
export function tlsCaOfLinkTable(created: string): string | null {
  return /ssl_ca "([^"]+)"/.exec(created)?.[1] ?? null;
}

/** The servers of a link table's buckets, by bucket, as the head knows them. */
export function serversOfLinkTable(created: string): string[] {
  const servers: string[] = [];
  for (const [, bucket, server = ''] of created.matchAll(/VALUES IN \((\d+)\)\s+COMMENT = 'srv "([^"]+)"/g))
    servers[Number(bucket)] = server;
  return servers;
}
