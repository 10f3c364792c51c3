import { parseArgs } from 'node:util';
import type { NewInterval } from '#db/queries/intervals';
import { readsBesideIngest } from './support/readsBesideIngest';
import { compare, digits, median, percentile, printTable } from './support/measure';
import { makeMonitors, postOf, sendAll, sendAtPace, type Post } from './support/monitors';
import { ProcessorTimes, SpentTime } from './support/processorTime';
import { insertStatement, RawInsert } from './support/rawInsert';
import { withOwnSchema } from './support/schema';
import { invent, makeNetwork } from './support/station';
import { Web } from './support/web';

/**
 * What the web takes from monitors in a second, as it is served, against D: inserting the same packed rows by mysql2 alone, as many
 * a statement, over as many connections. `npx tsx ops/bench/ingest.ts [--part batches|singles|reads] [--profile directory]`, about a minute and a half; needs a build.
 */
const FIRST_SEC = Date.parse('2025-01-01T00:00:00Z') / 1000;
const SENDERS = 4;
const TURNS = 5;
const SIZES = [
  { perPost: 600, posts: 20, target: '≥ 0.35, aim 0.5' },
  // A turn of 60 posts took half a second, too short to tell much.
  { perPost: 60, posts: 240, target: '≥ 0.3' },
];
const SINGLES = { monitors: 100, seconds: 10, postsPerSec: 500 };

const { values } = parseArgs({ options: { profile: { type: 'string' }, part: { type: 'string' } } });
const isAsked = (part: string) => values.part === undefined || values.part === part;

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const web = await Web.start(values.profile);
  const raw = await RawInsert.open(SENDERS);
  try {
    if (isAsked('batches')) await printRatios(web, raw, networkId);
    if (isAsked('singles')) await printSingles(web, networkId);
    if (isAsked('reads')) await readsBesideIngest(web, networkId);
    console.log(`Highest resident memory of the web: ${digits(web.highestMib)} MiB (target < 400)\n`);
  } finally {
    await raw.close();
    await web.stop();
  }
});

async function printRatios(web: Web, raw: RawInsert, networkId: number): Promise<void> {
  const rows: string[][] = [];
  for (const { perPost, posts, target } of SIZES) {
    const monitors = await makeMonitors(networkId, `POSTED-${perPost}`, SENDERS);
    const rawStations = await makeMonitors(networkId, `RAW-${perPost}`, SENDERS);
    const batches = await batchesOf(perPost, posts, TURNS + 1);
    const bodies = batches.map((turn) => turn.map(postOf));
    const statements = batches.map((turn) =>
      rawStations.map(({ stationId }) => turn.map((batch) => insertStatement(stationId, batch))),
    );
    const processor = await ProcessorTimes.of(web);
    const [cpu, cpuOfD] = [new SpentTime(), new SpentTime()];
    const { ms, againstMs } = await compare(
      TURNS,
      async (turn) => {
        const posts = Array<Post[]>(SENDERS).fill(bodies[turn + 1] ?? []);
        const spent = await processor.during(() => sendAll(web.origin, monitors, posts));
        // The first, which warms up, does not count.
        if (turn >= 0) cpu.add(spent);
      },
      async (turn) => {
        const spent = await processor.during(() => raw.run(statements[turn + 1] ?? []));
        if (turn >= 0) cpuOfD.add(spent);
      },
    );
    const postCount = SENDERS * posts;
    const ratios = ms.map((time, at) => (againstMs[at] ?? NaN) / time);
    const aPost = (cpuMs: number) => digits(cpuMs / (TURNS * postCount));
    rows.push([
      digits(perPost),
      digits(median(againstMs) / median(ms)),
      `${digits(Math.min(...ratios))}–${digits(Math.max(...ratios))}`,
      target,
      digits((postCount * perPost * 1000) / median(ms)),
      digits((postCount * perPost * 1000) / median(againstMs)),
      [cpu.web, cpu.database, cpu.own].map(aPost).join(' + '),
      [cpuOfD.database, cpuOfD.own].map(aPost).join(' + '),
      digits((cpuOfD.database + cpuOfD.own) / (cpu.web + cpu.database + cpu.own)),
    ]);
  }
  printTable(
    [
      'intervals a post',
      '÷ D',
      'over turns',
      'target',
      'acknowledged/s',
      'D, rows/s',
      'processor ms a post: web + database + senders',
      'D: database + its senders',
      'D ÷ all of a post',
    ],
    rows,
  );
}

async function printSingles(web: Web, networkId: number): Promise<void> {
  const { seconds, postsPerSec } = SINGLES;
  const monitors = await makeMonitors(networkId, 'SINGLE', SINGLES.monitors);
  const perMonitor = (seconds * postsPerSec) / SINGLES.monitors;
  const [own = []] = await batchesOf(1, perMonitor * 2, 1);
  const posts = own.map(postOf);
  await sendAtPace(
    web.origin,
    monitors,
    Array(SINGLES.monitors).fill(posts.slice(perMonitor, perMonitor + 5)),
    200,
  );
  const beforeMs = web.cpuMs;
  const ms = await sendAtPace(
    web.origin,
    monitors,
    Array(SINGLES.monitors).fill(posts.slice(0, perMonitor)),
    postsPerSec,
  );
  const cpuMs = (web.cpuMs - beforeMs) / (seconds * postsPerSec);
  const row = [postsPerSec, ...[0.5, 0.95, 0.99, 1].map((share) => percentile(ms, share)), cpuMs].map(digits);
  printTable(
    [
      'single intervals: posts/s',
      'p50 ms',
      'p95 ms',
      'p99 ms (target < 50)',
      'highest ms',
      'web CPU ms a post',
    ],
    [row],
  );
}

async function batchesOf(perPost: number, posts: number, turns: number): Promise<NewInterval[][][]> {
  const all = await invent(FIRST_SEC, perPost * posts * turns, 60);
  return Array.from({ length: turns }, (_, turn) =>
    Array.from({ length: posts }, (_post, post) => {
      const first = (turn * posts + post) * perPost;
      return all.slice(first, first + perPost);
    }),
  );
}
