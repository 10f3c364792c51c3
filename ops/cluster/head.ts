import { spawnSync } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  commonOptions,
  databaseDirectory,
  ensureOwner,
  giveAway,
  installDatabase,
  untilAnswered,
} from './databases';
import { certificateOf, HEAD_NODES, nodePorts, type Layout } from './layout';
import { pidOf, startProcess, stopProcess } from './processes';

const IS_READY =
  "SELECT 1 FROM information_schema.global_status WHERE variable_name = 'WSREP_READY' AND variable_value = 'ON'";
const STATE_FILE = 'grastate.dat';

const nameOf = (number: number) => `head${number}`;

/** Starts those nodes of the head that do not run, and waits until all are ready. Without any that runs, the one that knows most begins. */
export async function startHead(layout: Layout): Promise<void> {
  const down = HEAD_NODES.filter((number) => pidOf(layout, nameOf(number)) === null);
  if (down.length === HEAD_NODES.length) {
    const isNew = !existsSync(join(dataOf(layout, 1), 'mysql'));
    if (isNew) installDatabase(layout, nameOf(1));
    const first = isNew ? 1 : mostKnowing(layout);
    startNode(layout, first, ['--wsrep-new-cluster']);
    await untilAnswered(layout, nameOf(first), IS_READY);
    if (isNew) await beginAlike(layout);
    return startHead(layout);
  }
  // One after another: a node that gives its state to one cannot give it to the next.
  for (const number of down) {
    mkdirSync(dataOf(layout, number), { recursive: true, mode: 0o711 });
    giveAway(databaseDirectory(layout, nameOf(number)));
    startNode(layout, number, []);
    await untilAnswered(layout, nameOf(number), IS_READY);
  }
}

/** The first node of a new head gives its files to the others: sooner than by a state transfer to one after another. */
async function beginAlike(layout: Layout): Promise<void> {
  await ensureOwner(layout, nameOf(1));
  await stopProcess(layout, nameOf(1));
  for (const number of HEAD_NODES.slice(1)) {
    const directory = databaseDirectory(layout, nameOf(number));
    mkdirSync(directory, { recursive: true, mode: 0o711 });
    cpSync(dataOf(layout, 1), dataOf(layout, number), { recursive: true });
    giveAway(directory);
  }
}

const dataOf = (layout: Layout, number: number) => join(databaseDirectory(layout, nameOf(number)), 'data');

function startNode(layout: Layout, number: number, more: readonly string[]): void {
  startProcess(layout, nameOf(number), ['mariadbd', ...nodeOptions(layout, number), ...more]);
}

function nodeOptions(layout: Layout, number: number): string[] {
  const { sql, group, increments, transfer } = nodePorts(layout, number);
  const others = HEAD_NODES.map((other) => `127.0.0.1:${nodePorts(layout, other).group}`);
  const made = certificateOf(layout);
  const provider = [
    `base_port=${group}`,
    `gmcast.listen_addr=tcp://127.0.0.1:${group}`,
    `ist.recv_addr=127.0.0.1:${increments}`,
    'gcache.size=96M',
    // A node that says nothing is left out after these: on one machine a node is silent only when it is dead.
    'evs.suspect_timeout=PT3S',
    'evs.inactive_timeout=PT8S',
    ...(made
      ? [
          `socket.ssl_ca=${made.certificate}`,
          `socket.ssl_cert=${made.certificate}`,
          `socket.ssl_key=${made.key}`,
        ]
      : []),
  ];
  return [
    ...commonOptions(layout, nameOf(number), sql),
    '--wsrep-on=ON',
    '--wsrep-provider=/usr/lib/galera/libgalera_smm.so',
    `--wsrep-provider-options=${provider.join(';')}`,
    '--wsrep-cluster-name=bittern',
    `--wsrep-cluster-address=gcomm://${others.join(',')}`,
    `--wsrep-node-name=${nameOf(number)}`,
    `--wsrep-node-address=127.0.0.1:${group}`,
    '--wsrep-sst-method=rsync',
    `--wsrep-sst-donor=${donorFor(number)}`,
    `--wsrep-sst-receive-address=127.0.0.1:${transfer}`,
    // What a transaction begins with has everything that any node has committed before.
    '--wsrep-sync-wait=1',
    '--binlog-format=ROW',
    '--innodb-autoinc-lock-mode=2',
    ...SPIDER_OPTIONS,
  ];
}

/**
 * Who gives its state to a node, by preference: the last, as all write to the first that lives, and who gives takes no statements meanwhile.
 * The comma lets any other give it where that one does not run.
 */
function donorFor(number: number): string {
  return `${nameOf(HEAD_NODES.findLast((other) => other !== number) ?? number)},`;
}

/** How the head reaches the data servers. */
const SPIDER_OPTIONS = [
  '--plugin-load-add=ha_spider.so',
  '--spider-connect-timeout=2',
  '--spider-net-read-timeout=60',
  '--spider-net-write-timeout=60',
  // A statement's rows travel together.
  '--spider-bulk-size=4000000',
  '--spider-remote-time-zone=+00:00',
];

/** The node that has the last transaction, which then may begin a group anew. After a crash of all nodes each has to look. */
function mostKnowing(layout: Layout): number {
  const states = HEAD_NODES.flatMap((number) => {
    const path = join(dataOf(layout, number), STATE_FILE);
    return existsSync(path) ? [{ number, path, text: readFileSync(path, 'utf8') }] : [];
  });
  const left = states.find(({ text }) => /safe_to_bootstrap: 1/.test(text));
  if (left) return left.number;
  const [best] = states
    .map((state) => ({ ...state, last: lastTransaction(layout, state.number) }))
    .sort((a, b) => b.last - a.last);
  if (!best) return 1;
  writeFileSync(best.path, best.text.replace('safe_to_bootstrap: 0', 'safe_to_bootstrap: 1'));
  return best.number;
}

function lastTransaction(layout: Layout, number: number): number {
  const { stdout, stderr } = spawnSync('mariadbd', [...nodeOptions(layout, number), '--wsrep-recover'], {
    encoding: 'utf8',
  });
  const found = /Recovered position: [0-9a-f-]+:(-?\d+)/.exec(stdout + stderr);
  return found ? Number(found[1]) : -1;
}
