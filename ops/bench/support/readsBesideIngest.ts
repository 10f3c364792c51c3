import { randomUUID } from 'node:crypto';
import { performance } from 'node:perf_hooks';
import { setTimeout as sleep } from 'node:timers/promises';
import { insertAccessToken } from '#db/queries/accessTokens';
import { inTransaction } from '#db/queries/connection';
import { insertMembership, insertUser } from '#db/queries/users';
import { formatInstantUtc } from '#lib/contracts/common';
import { digits, percentile, printTable } from './measure';
import { makeMonitors, postOf, send } from './monitors';
import { FIRST_SEC, fillMonth, MONTH_SEC } from './months';
import { invent, makeStation } from './station';
import type { Web } from './web';

const ASKS = 60;
const PAUSE_MS = 50;
const SENDERS = 4;
const PER_POST = 600;
const POSTS = 100;

/** How long a person waits for a station's month while four other monitors send as fast as they are answered, against quiet. */
export async function readsBesideIngest(web: Web, networkId: number): Promise<void> {
  const station = await makeStation(networkId, 'READ', 60);
  await fillMonth(station);
  const token = await readersToken(networkId);
  const month = `from=${formatInstantUtc(FIRST_SEC)}&to=${formatInstantUtc(FIRST_SEC + MONTH_SEC)}`;
  const statistics = `${web.origin}/api/v1/networks/bench/stations/READ/statistics?${month}`;
  const page = `${web.origin}/sign-in`;
  const asked = { '…/statistics of a month': statistics, 'a page (sign-in)': page };
  const quiet = await askAll(asked, token);
  const flood = new AbortController();
  const flooding = floodUntil(web, networkId, flood.signal);
  await sleep(500);
  const busy = await askAll(asked, token);
  flood.abort();
  const perSec = await flooding;
  const rows = Object.keys(asked).map((name) => {
    const [before, during] = [quiet[name] ?? [], busy[name] ?? []].map((ms) => percentile(ms, 0.95));
    return [
      name,
      digits((during ?? NaN) / (before ?? NaN)),
      '≤ 3',
      digits(before ?? NaN),
      digits(during ?? NaN),
    ];
  });
  printTable(['while monitors send', 'p95 ÷ quiet', 'target', 'p95 quiet ms', 'p95 ms'], rows);
  console.log(`Acknowledged beside it: ${digits(perSec)} intervals/s\n`);
}

async function readersToken(networkId: number): Promise<string> {
  const userId = randomUUID();
  return inTransaction(async (transaction) => {
    await insertUser(
      {
        id: userId,
        email: 'reader@bench.example',
        name: 'Reader',
        passwordHash: '-',
        isAdministrator: false,
      },
      transaction,
    );
    await insertMembership({ userId, networkId, role: 'regulator' }, transaction);
    const expiresAt = new Date(Date.now() + 3_600_000);
    const token = { userId, name: 'bench', expiresAt, access: 'read', families: null } as const;
    return insertAccessToken(token, transaction);
  });
}

async function askAll(asked: Record<string, string>, token: string): Promise<Record<string, number[]>> {
  const ms: Record<string, number[]> = {};
  for (let ask = -3; ask < ASKS; ask += 1) {
    for (const [name, url] of Object.entries(asked)) {
      const startMs = performance.now();
      const response = await fetch(url, { headers: { authorization: `Bearer ${token}` } });
      await response.arrayBuffer();
      if (!response.ok) throw new Error(`${url} answered ${response.status}.`);
      if (ask >= 0) (ms[name] ??= []).push(performance.now() - startMs);
    }
    await sleep(PAUSE_MS);
  }
  return ms;
}

/** Sends from several monitors until told to stop, over and over, to new stations each time. @returns intervals acknowledged a second. */
async function floodUntil(web: Web, networkId: number, signal: AbortSignal): Promise<number> {
  const intervals = await invent(FIRST_SEC, PER_POST * POSTS, 60);
  const posts = Array.from({ length: POSTS }, (_, at) =>
    postOf(intervals.slice(at * PER_POST, (at + 1) * PER_POST)),
  );
  const startMs = performance.now();
  let count = 0;
  const flood = async (sender: number) => {
    for (let round = 0; !signal.aborted; round += 1) {
      const [monitor] = await makeMonitors(networkId, `FLOOD-${sender}-${round}`, 1);
      for (const post of posts) {
        if (signal.aborted || !monitor) return;
        await send(web.origin, monitor, post);
        count += post.count;
      }
    }
  };
  await Promise.all(Array.from({ length: SENDERS }, (_, sender) => flood(sender)));
  return (count * 1000) / (performance.now() - startMs);
}
