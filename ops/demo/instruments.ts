import { addCalibration } from '#lib/services/calibrations/add';
import { addInstrument } from '#lib/services/instruments/add';
import { deploy } from '#lib/services/instruments/deploy';
import { DEMO_INSTRUMENTS, type DemoCheck, type DemoInstrument } from './instrumentList';
import { must } from './must';
import type { DemoStation } from './stations';

const DAY_SEC = 86_400;
const HOUR_SEC = 3600;
const CALIBRATOR = { calibrator: 'Class 1 calibrator K-207', calibratorLevel: 94 };

interface Desk {
  networkId: number;
  userId: string;
  nowSec: number;
  historyDays: number;
  stations: DemoStation[];
}

/** The demo's instruments, where each stood and how its checks came out. */
export async function seedInstruments(desk: Desk): Promise<number> {
  for (const instrument of DEMO_INSTRUMENTS) await seedInstrument(desk, instrument);
  return DEMO_INSTRUMENTS.length;
}

async function seedInstrument(desk: Desk, { stay, checks, ...about }: DemoInstrument): Promise<void> {
  const { networkId, userId, nowSec } = desk;
  const { id } = must(await addInstrument(networkId, about, userId));
  const { code, note } = stay;
  const beginSec = startOf(desk, code);
  // A short history still has its swap: half of it at each end.
  const at = (daysAgo: number | null) =>
    daysAgo === null ? null : hourAgo(desk, Math.min(daysAgo, desk.historyDays / 2));
  const from = at(stay.fromDaysAgo) ?? beginSec;
  const act = { networkId, instrumentId: id, userId, nowSec };
  must(await deploy(act, { station: code, from, to: at(stay.toDaysAgo), note }));
  for (const check of checks) await seedCheck(desk, id, check, from);
}

async function seedCheck(desk: Desk, instrument: number, check: DemoCheck, fromSec: number): Promise<void> {
  const { daysAgo, ...found } = check;
  const checkedAt = daysAgo === 'arrival' ? fromSec : hourAgo(desk, daysAgo);
  must(await addCalibration(desk, { instrument, checkedAt, ...CALIBRATOR, ...found }));
}

/** Before the first interval of a station. */
function startOf({ stations, nowSec, historyDays }: Desk, code: string): number {
  const site = stations.find((one) => one.site.code === code)?.site;
  const days = site?.joinedDaysAgo ?? historyDays;
  return Math.floor((nowSec - days * DAY_SEC) / HOUR_SEC) * HOUR_SEC;
}

function hourAgo({ nowSec }: Desk, daysAgo: number): number {
  return Math.floor((nowSec - daysAgo * DAY_SEC) / HOUR_SEC) * HOUR_SEC;
}
