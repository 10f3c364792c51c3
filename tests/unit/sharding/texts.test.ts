import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { BUCKETS, KINDS } from '#db/sharding/kinds';
import { bucketTableText, isLinkTable, linkTableText, serversOfLinkTable } from '#db/sharding/texts';

const schema = readFileSync('db/schema.sql', 'utf8');

function createdOf(table: string): string {
  const found = new RegExp(`^CREATE TABLE \`${table}\` [\\s\\S]*?;$`, 'm').exec(schema)?.[0];
  if (!found) throw new Error(`There is no ${table}.`);
  return found.slice(0, -1);
}

test('every kind has the station in each unique key, so that it can be parted by it', () => {
  for (const kind of KINDS) {
    const keys = [...createdOf(kind).matchAll(/(?:PRIMARY|UNIQUE) KEY[^(]*\(([^)]*)\)/g)];
    expect(keys.length, kind).toBeGreaterThan(0);
    for (const [, columns] of keys) expect(columns, kind).toContain('`station_id`');
  }
});

test('no kind has a column that the server computes: a data server would refuse what the head sends', () => {
  for (const kind of KINDS) expect(createdOf(kind), kind).not.toMatch(/GENERATED ALWAYS/);
});

test('the table of a bucket is the local one without foreign keys and counter, with its partitions', () => {
  const created = `CREATE TABLE \`dirty_marks\` (
  \`id\` bigint(20) unsigned NOT NULL AUTO_INCREMENT,
  \`station_id\` int(10) unsigned NOT NULL,
  PRIMARY KEY (\`station_id\`,\`id\`),
  CONSTRAINT \`marks_station\` FOREIGN KEY (\`station_id\`) REFERENCES \`stations\` (\`id\`) ON DELETE CASCADE
) ENGINE=InnoDB AUTO_INCREMENT=77 DEFAULT CHARSET=utf8mb4
 PARTITION BY RANGE (\`id\`)
(PARTITION \`p0\` VALUES LESS THAN MAXVALUE ENGINE = InnoDB)`;
  const text = bucketTableText(created, 'dirty_marks', 7);
  expect(text).toMatch(/^CREATE TABLE IF NOT EXISTS `dirty_marks_07` \(/);
  expect(text).not.toMatch(/CONSTRAINT|AUTO_INCREMENT=/);
  expect(text).toMatch(/PRIMARY KEY \(`station_id`,`id`\)\n\) ENGINE=InnoDB/);
  expect(text).toMatch(/PARTITION BY RANGE/);
  const link = linkTableText(created, 'dirty_marks', 'dirty_marks__linked', () => 'head_data1');
  expect(link).not.toMatch(/PARTITION BY RANGE|InnoDB|CONSTRAINT/);
  expect(link).toContain('auto_increment_mode "3"');
});

test('a link table tells which server each bucket is on, and a link table of a link table the same', () => {
  const serverOf = (bucket: number) => (bucket % 3 === 0 ? 'bittern_data1' : 'bittern_data2');
  for (const kind of KINDS) {
    const link = linkTableText(createdOf(kind), kind, `${kind}__linked`, serverOf);
    expect(isLinkTable(createdOf(kind))).toBe(false);
    expect(isLinkTable(link), kind).toBe(true);
    const servers = Array.from({ length: BUCKETS }, (_, bucket) => serverOf(bucket));
    expect(serversOfLinkTable(link)).toEqual(servers);
    expect(serversOfLinkTable(linkTableText(link, kind, kind, () => 'bittern_data9'))).toEqual(
      Array<string>(BUCKETS).fill('bittern_data9'),
    );
  }
});
