import { setTimeout as sleep } from 'node:timers/promises';
import { Sender, lastKnownStartSec, type SendOutcome, type SenderSettings } from './sender';
import { Spool } from './spool';

export interface MonitorSettings extends SenderSettings {
  intervalSec: number;
  spoolDirectory: string;
  /** Seconds between posts while nothing is behind. */
  postEverySec: number;
  /** How far back a monitor that was switched on again fills in, seconds. */
  memorySec: number;
  /** What was measured in the interval from `startSec`, or null for none (a gap). */
  measure(startSec: number): unknown;
  onOutcome?(outcome: SendOutcome): void;
}

/**
 * A field monitor: measures interval by interval, keeps each on disk until the server has answered for it, posts in
 * gzipped batches, backs off when told to or when the link is down, and goes on from what the server has after a crash
 * of either side. Runs until `signal` aborts.
 */
export async function runMonitor(settings: MonitorSettings, signal: AbortSignal): Promise<void> {
  const spool = new Spool(settings.spoolDirectory);
  const sender = new Sender(spool, settings);
  let nextSec = await firstStartSec(settings, spool, signal);
  while (!signal.aborted) {
    nextSec = measureUntil(nowSec(), nextSec, settings, spool);
    const waitSec = await postAll(sender, settings, signal);
    await sleep(waitSec * 1000, undefined, { signal }).catch(() => undefined);
  }
}

async function firstStartSec(settings: MonitorSettings, spool: Spool, signal: AbortSignal): Promise<number> {
  const { intervalSec, memorySec } = settings;
  const known = await lastKnownStartSec(settings, signal);
  const last = Math.max(known ?? 0, spool.lastStartSec ?? 0);
  const earliest = Math.ceil((nowSec() - memorySec) / intervalSec) * intervalSec;
  return last === 0
    ? Math.floor(nowSec() / intervalSec) * intervalSec
    : Math.max(last + intervalSec, earliest);
}

function measureUntil(untilSec: number, fromSec: number, settings: MonitorSettings, spool: Spool): number {
  const { intervalSec, measure } = settings;
  const records: { startSec: number; record: unknown }[] = [];
  let startSec = fromSec;
  for (; startSec + intervalSec <= untilSec; startSec += intervalSec) {
    const record = measure(startSec);
    if (record !== null) records.push({ startSec, record });
  }
  spool.append(records);
  return startSec;
}

/** Posts until nothing waits or the server wants a pause; answers the seconds to wait. */
async function postAll(sender: Sender, settings: MonitorSettings, signal: AbortSignal): Promise<number> {
  for (;;) {
    const outcome = await sender.sendOnce(signal);
    settings.onOutcome?.(outcome);
    if (outcome.kind === 'later') return outcome.waitSec;
    if (outcome.kind === 'refused') return 60;
    if (outcome.kind === 'nothing' || signal.aborted) return settings.postEverySec;
  }
}

function nowSec(): number {
  return Date.now() / 1000;
}
