import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { lockMast, type MastRow } from '#db/queries/masts';
import {
  countRefusedWeather,
  insertSupersededWeather,
  listRefusedWeather,
  lockRefusedWeather,
  settleRefusedWeather,
  type WeatherSettlement,
} from '#db/queries/weatherQuarantine';
import { deleteWeather, selectWeather } from '#db/queries/weatherRecords';
import { formatInstantUtc, parseInstant } from '#lib/contracts/common';
import {
  MOST_WEATHER_SETTLED,
  type RefusedWeatherRecord,
  type WeatherSettled,
  type WeatherSettling,
} from '#lib/contracts/weatherQuarantine';
import { refusedWeatherJson } from './keptWeather';
import { takeRecords } from './receive';
import { markStationsOf, spansSpokenOf } from './touched';

/** Refused records of a mast in a state (null: any), the latest kept first. */
export async function refusedWeather(
  mast: MastRow,
  state: WeatherSettlement | 'open' | null,
  limit: number,
): Promise<RefusedWeatherRecord[]> {
  return (await listRefusedWeather(mast.id, state, limit)).map(refusedWeatherJson);
}

/** Masts of a network that have open refused records, with how many. */
export function openRefusedWeather(networkId: number): Promise<{ mastCode: string; count: number }[]> {
  return countRefusedWeather(networkId);
}

const FROM = {
  release: ['open', 'superseded'],
  replace: ['open', 'superseded'],
  dismiss: ['open'],
  reopen: ['dismissed'],
} as const;

/** Does with refused records of a mast what an operator decided; figures follow where records are taken. */
export async function settleWeather(
  mast: MastRow,
  settling: WeatherSettling,
  userId: string,
  now: Date,
): Promise<WeatherSettled> {
  const { act, ids = null } = settling;
  try {
    return await inTransaction(
      async (transaction) => {
        await lockMast(mast.id, transaction);
        // All of them are those that wait; one that was stored once is named.
        const states = ids ? FROM[act] : FROM[act].slice(0, 1);
        const rows = await lockRefusedWeather(mast.id, ids, states, MOST_WEATHER_SETTLED, transaction);
        const { settledIds, detail } = await settledOf(mast, rows, settling, { userId, now }, transaction);
        const reason = settling.reason ?? null;
        const as: WeatherSettlement = act === 'dismiss' ? 'dismissed' : 'released';
        const settlement = act === 'reopen' ? null : { as, by: userId, reason };
        if (settledIds.length > 0) {
          await settleRefusedWeather(settledIds, settlement, transaction);
          await appendAudit(
            {
              userId,
              networkId: mast.networkId,
              action: `weather-quarantine.${act}`,
              subject: `mast ${mast.code}`,
              detail: { records: settledIds, ...(reason === null ? {} : { reason }) },
            },
            transaction,
          );
        }
        return {
          settled: settledIds.length,
          passedOver: (ids?.length ?? rows.length) - settledIds.length,
          detail,
        };
      },
      { isolationLevel: 'read committed' },
    );
  } catch (error) {
    if (error instanceof StillRefused) return { settled: 0, passedOver: 1, detail: error.message };
    throw error;
  }
}

/** What was put aside for nothing goes back with the transaction. */
class StillRefused extends Error {}

type Kept = Awaited<ReturnType<typeof lockRefusedWeather>>;
interface By {
  userId: string;
  now: Date;
}

async function settledOf(
  mast: MastRow,
  rows: Kept,
  { act, reason }: WeatherSettling,
  by: By,
  transaction: Connection,
): Promise<{ settledIds: number[]; detail: string | null }> {
  const settledIds = rows.map(({ id }) => Number(id));
  if (act === 'dismiss' || act === 'reopen' || rows.length === 0) return { settledIds, detail: null };
  const records = rows.map(({ record }) => JSON.parse(record) as unknown);
  if (act === 'replace') await displace(mast, records[0], reason ?? '', by, transaction);
  const { refused } = await takeRecords(mast, records, by.now, transaction);
  const [first] = refused;
  if (act === 'replace' && first) throw new StillRefused(first.detail);
  const stillRefused = new Set(refused.map(({ index }) => index));
  return {
    settledIds: settledIds.filter((_, index) => !stillRefused.has(index)),
    detail: first?.detail ?? null,
  };
}

/** Keeps the stored record that has the start of a refused one, as superseded, and takes it out. */
async function displace(
  mast: MastRow,
  record: unknown,
  reason: string,
  { userId, now }: By,
  transaction: Connection,
): Promise<void> {
  const start: unknown = (record as { start?: unknown } | null)?.start;
  const startSec = typeof start === 'string' ? parseInstant(start) : null;
  if (startSec === null) return;
  const around = await selectWeather(mast.id, startSec, startSec + 1, mast.maximumAgeSec, transaction);
  const stored = around.find((one) => one.startSec === startSec);
  if (!stored) return;
  const kept = {
    start: formatInstantUtc(startSec),
    seconds: stored.durationSec,
    windSpeed: stored.windSpeedMs,
    windDirection: stored.windDirectionDeg,
    rain: stored.rainMm,
    temperature: stored.temperatureC,
  };
  const detail = 'Stored until a released record replaced it.';
  await insertSupersededWeather(
    mast.id,
    { detail, record: JSON.stringify(kept), startSec },
    { userId, reason, receivedAt: now },
    transaction,
  );
  await deleteWeather(mast.id, startSec, transaction);
  const spans = spansSpokenOf(around, (one) => one === stored, mast.maximumAgeSec);
  await markStationsOf(mast.id, spans, transaction);
}
