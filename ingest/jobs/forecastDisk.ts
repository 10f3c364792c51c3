import { mkdir, statfs } from 'node:fs/promises';
import { inTransaction } from '#db/queries/connection';
import {
  databaseBytes,
  deleteDiskSamplesBefore,
  diskSamplesSince,
  insertDiskSample,
  lowSince,
} from '#db/queries/diskSamples';
import { listNetworks } from '#db/queries/networks';
import { operatorAddresses } from '#db/queries/calibrationSettings';
import { putNotes } from '#ingest/health/mail';
import { config } from '#lib/config/index';
import { diskForecast, type DiskForecast } from '#lib/services/operation/diskForecast';
import { eachAlone, networkSubject } from './alone';

const DAY_MS = 86_400_000;
const LOOK_BACK_MS = 28 * DAY_MS;
const KEEP_MS = 400 * DAY_MS;
/** So little room is told of whatever the forecast says. */
const LEAST_FREE_SHARE = 0.05;
const STAYS_LOW = 1.25;
const GIB = 2 ** 30;

/**
 * Notes how full the disk is, and writes to operators when it will be full within the setting's days: once when that begins, and once a week
 * for as long as it lasts.
 */
export async function forecastDisk(now: Date): Promise<string> {
  // Nothing may have been kept in it yet.
  await mkdir(config().dataDir, { recursive: true });
  const { bavail, bsize, blocks } = await statfs(config().dataDir);
  const sample = { takenAt: now, totalBytes: blocks * bsize, freeBytes: bavail * bsize };
  await deleteDiskSamplesBefore(new Date(now.getTime() - KEEP_MS));
  const [earlier, since] = await Promise.all([
    diskSamplesSince(new Date(now.getTime() - LOOK_BACK_MS)),
    lowSince(),
  ]);
  const forecast = diskForecast([...earlier, sample]);
  const low = forecast !== null && isLow(forecast, config().diskWarnDays, since !== null);
  await insertDiskSample({ ...sample, databaseBytes: await databaseBytes(), isLow: low });
  if (!low) return 'room enough';
  const warn = ({ id }: { id: number }) => warnNetwork(id, forecast, since ?? now, now);
  return `${await eachAlone('forecast-disk', await listNetworks(), networkSubject, warn, now)} warnings`;
}

/**
 * Whether it will be full within some days, or nearly is. What was low stays so until there is a quarter more room than made it low: a disk on the
 * edge must not be told of every hour.
 */
export function isLow(
  { totalBytes, freeBytes, daysLeft }: DiskForecast,
  warnDays: number,
  wasLow: boolean,
): boolean {
  const factor = wasLow ? STAYS_LOW : 1;
  return (
    (daysLeft !== null && daysLeft < warnDays * factor) || freeBytes < LEAST_FREE_SHARE * factor * totalBytes
  );
}

async function warnNetwork(
  networkId: number,
  forecast: DiskForecast,
  since: Date,
  now: Date,
): Promise<number> {
  const recipients = await operatorAddresses(networkId);
  const { freeBytes, totalBytes, bytesADay, daysLeft } = forecast;
  const gib = (bytes: number) => `${(bytes / GIB).toFixed(1)} GiB`;
  const note = {
    subject:
      daysLeft === null ? 'The disk is nearly full' : `The disk will be full in ${Math.floor(daysLeft)} days`,
    opening:
      'When it is full, monitors are asked to come again and keep what they measure, and nothing is computed until there is room.',
    facts: [
      ['Free', `${gib(freeBytes)} of ${gib(totalBytes)}`],
      ['Written a day', bytesADay === null ? 'not known yet' : gib(bytesADay)],
    ] as const,
    link: { label: 'Open Bittern', url: config().origin },
    closing:
      'Whoever runs the server can give its disk more room; an administrator can have single intervals kept for a shorter time, in the network’s settings. ' +
      'You get this once a week, as an operator, until there is room.',
  };
  const week = Math.floor((now.getTime() - since.getTime()) / (7 * DAY_MS));
  return inTransaction((transaction) =>
    putNotes(
      note,
      { networkId, kind: 'disk', key: `${since.toISOString()} week ${week}` },
      recipients,
      transaction,
    ),
  );
}
