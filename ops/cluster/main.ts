import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { closeDb, db } from '#db/client';
import { dataServers, type DataServer } from '#db/sharding/dataServers';
import { BUCKETS } from '#db/sharding/kinds';
import { linkServers } from '#db/sharding/linkServers';
import { migrateUp } from '#db/migrateUp';
import { ensureDatabase } from '#ops/start/ownDatabase';
import { config } from '#lib/config/index';
import { httpPort, layoutIn, settingsOf, type Layout } from './layout';
import { emptyServer, moveBucket } from './moveBucket';
import { killProcess, pidOf, startedNames } from './processes';
import { secretsIn, startDatabases, startPrograms, stopAll } from './programs';
import { tellStatus } from './status';

const USAGE = `ops/cluster.sh COMMAND
  up [--data 2] [--tls] [--only-databases]
                                     builds what is not there, and starts what does not run; --tls, at the first time: all that they say to each other is encrypted
  heal                               starts what does not run
  status                             what runs, and how the head's nodes stand
  kill NAME                          ends one without warning: head1 … head3, data1 …, web1, web2, worker1, worker2, proxy
  move BUCKET SERVER                 moves a bucket (0 … 63) to another data server while all goes on; to its own: takes a broken move back
  empty SERVER                       moves all of a data server's buckets to the others
  link                               tells the head where the data servers are: before a dump of the head is brought back
  down                               stops everything; the data stay
All of it stands in BITTERN_CLUSTER_DIR (.bittern-cluster); its ports begin at BITTERN_CLUSTER_PORT (4600).
Where BITTERN_DATA_SERVERS is set, move, empty and link are for the cluster of the settings, on whatever hosts it is.`;

const OF_SETTINGS = ['move', 'empty', 'link'];
const directory = process.env['BITTERN_CLUSTER_DIR'] || '.bittern-cluster';
const [command = '', ...given] = process.argv.slice(2);

try {
  process.exitCode = await run();
} catch (error) {
  console.error(error instanceof Error ? (error.stack ?? error.message) : error);
  process.exitCode = 1;
} finally {
  await closeDb();
}

function run(): Promise<number> {
  return OF_SETTINGS.includes(command) ? runOnSettings() : runHere(readLayout());
}

async function runOnSettings(): Promise<number> {
  if (!process.env['BITTERN_DATA_SERVERS']) useSettings(readLayout());
  const [first = '', second = ''] = given;
  if (command === 'move') return move(first, second);
  if (command === 'empty') await emptyServer(serverNamed(first), console.log);
  if (command === 'link') await linkServers(db(), dataServers());
  return 0;
}

async function runHere(layout: Layout): Promise<number> {
  switch (command) {
    case 'up':
    case 'heal':
      await startDatabases(layout);
      useSettings(layout);
      await ensureDatabase(config());
      await migrateUp();
      if (given.includes('--only-databases')) return 0;
      await startPrograms(layout, { BITTERN_PERSONAL_DATA_KEY: secretsIn(directory).personalDataKey });
      console.log(`Bittern is at http://127.0.0.1:${httpPort(layout)}`);
      return 0;
    case 'status':
      await tellStatus(layout);
      return startedNames(layout).every((name) => pidOf(layout, name) !== null) ? 0 : 1;
    case 'kill':
      if (killProcess(layout, given[0] ?? '')) return 0;
      console.error(`${given[0] ?? 'Nothing'} does not run.`);
      return 1;
    case 'down':
      await stopAll(layout);
      return 0;
    default:
      console.error(USAGE);
      return 2;
  }
}

/** The number of data servers is kept, and may grow: buckets are moved to new ones by hand. */
function readLayout(): Layout {
  const path = join(directory, 'cluster.json');
  const kept = existsSync(path)
    ? (JSON.parse(readFileSync(path, 'utf8')) as { dataServers: number; hasTls?: boolean })
    : null;
  const at = given.indexOf('--data');
  const dataServers = at >= 0 ? Number(given[at + 1]) : (kept?.dataServers ?? 2);
  if (!Number.isInteger(dataServers) || dataServers < (kept?.dataServers ?? 1) || dataServers > 4)
    throw new Error('--data: 1 to 4 data servers; no fewer than there are.');
  const isAsked = given.includes('--tls');
  if (kept && isAsked && !kept.hasTls) throw new Error('--tls: this cluster was made without; make another.');
  const hasTls = kept?.hasTls ?? isAsked;
  const { password } = secretsIn(directory);
  writeFileSync(path, JSON.stringify({ dataServers, hasTls }));
  const basePort = Number(process.env['BITTERN_CLUSTER_PORT'] || '4600');
  return layoutIn(directory, { basePort, dataServers, password, hasTls });
}

async function move(bucketText: string, name: string): Promise<number> {
  const bucket = Number(bucketText);
  if (bucketText === '' || !Number.isInteger(bucket) || bucket < 0 || bucket >= BUCKETS)
    throw new Error(`A bucket is a number from 0 to ${BUCKETS - 1}.`);
  const heldMs = await moveBucket(bucket, serverNamed(name));
  console.log(`Bucket ${bucket} is on ${name}; it was held for ${Math.round(heldMs)} ms.`);
  return 0;
}

function serverNamed(name: string): DataServer {
  const server = dataServers().find((one) => one.name === name);
  if (!server) throw new Error(`There is no data server ${name}.`);
  return server;
}

function useSettings(layout: Layout): void {
  Object.assign(process.env, settingsOf(layout), {
    BITTERN_PERSONAL_DATA_KEY: secretsIn(directory).personalDataKey,
  });
}
