import { pool, type Connection } from '#db/queries/connection';
import { listHolidays } from '#db/queries/holidays';
import { findLimit, type LimitVersion } from '#db/queries/limits';
import { listSettings, pickSettings } from '#db/queries/networks';
import { listStationGroups } from '#db/queries/stationGroups';
import { listStations } from '#db/queries/stations';
import { toTenths } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import {
  MOST_TRIAL_WINDOWS,
  type LimitTrialAnswer,
  type TrialSummary,
  type TrialWindow,
} from '#lib/contracts/limitTrial';
import { versionAt } from '#lib/services/limits/force';
import { readRule } from '#lib/services/limits/rule';
import { done, unknown } from '#lib/services/outcome';
import { startOfDaySec } from '#lib/time/zone';
import { coversStation } from '../limits/force';
import { type JobWatch } from '../threads/messages';
import { sizeProblem } from './size';
import { caughtInOrder, summaryOf } from './summary';
import { TrialSteps } from './trialSteps';
import { type TrialOutcome, type TrialTask } from './trialTask';
import { daysOf, tryRule, type CaughtWindow, type TrialGround, type TrialRule } from './tryRule';

/** A rule with what it caught, in order of time. */
interface Tried {
  rule: TrialRule;
  caught: CaughtWindow[];
  summary: TrialSummary;
}

type Codes = ReadonlyMap<number, string>;

/**
 * Tries a limit on past data, and beside it today's version of the limit that it is to replace. Nothing is stored. What a
 * field cannot be tried with is told, and how far it is.
 * @throws {JobCancelled}
 */
export async function tryLimit(
  { networkId, query, nowSec }: TrialTask,
  watch: JobWatch,
  conn: Connection = pool(),
): Promise<TrialOutcome> {
  const stations = await listStations(networkId, conn);
  const places = { stations, groups: await listStationGroups(networkId, conn) };
  const read = readRule({ ...query.limit, effectiveFrom: undefined }, places, nowSec);
  if (!read.isValid) return { kind: 'invalid', problems: read.problems };
  const today = query.basedOn === null ? null : await versionOfToday(networkId, query.basedOn, nowSec, conn);
  if (query.basedOn !== null && !today) return unknown('The network has no limit with this number.');
  const problem = sizeProblem(query, read.version, read.version.stationIds?.length ?? stations.length);
  if (problem) return { kind: 'invalid', problems: [problem] };
  const timeline = await listSettings(networkId, conn);
  const holidayDates = new Set((await listHolidays(networkId, conn)).map(({ date }) => date));
  const zone = pickSettings(timeline, nowSec).timeZone;
  const period = { fromSec: startOfDaySec(query.from, zone), toSec: startOfDaySec(query.to, zone) };
  const days = [read.version, ...(today ? [today] : [])].reduce(
    (sum, rule) => sum + daysOf(period) * stations.filter(({ id }) => coversStation(rule, id)).length,
    0,
  );
  const steps = new TrialSteps(Math.ceil(days), watch);
  const ground: TrialGround = { stations, timeline, holidayDates, period, nowSec, steps };
  const own = await tried(read.version, ground, zone, conn);
  const other = today && { ...(await tried(today, ground, zone, conn)), version: today };
  const codes = new Map(stations.map(({ id, code }) => [id, code]));
  return done({
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    dataAsOf: null,
    trial: own.summary,
    windows: ownWindows(own, other, codes),
    ...besides(own, other, codes),
  });
}

/** The version in force of a limit, or the one to come; null without such a limit. */
async function versionOfToday(
  networkId: number,
  limitId: number,
  nowSec: number,
  conn: Connection,
): Promise<LimitVersion | null> {
  const ofLimit = await findLimit(networkId, limitId, conn);
  return versionAt(ofLimit, nowSec) ?? ofLimit[0] ?? null;
}

async function tried(rule: TrialRule, ground: TrialGround, zone: string, conn: Connection): Promise<Tried> {
  const stations = await tryRule(rule, ground, conn);
  const summary = summaryOf(rule, stations, ground.period, zone);
  return { rule, caught: caughtInOrder(stations), summary };
}

function ownWindows({ rule, caught }: Tried, other: Tried | null, codes: Codes): LimitTrialAnswer['windows'] {
  const otherKeys = other && new Set(other.caught.map(keyOf));
  return caught.slice(0, MOST_TRIAL_WINDOWS).map((window) => ({
    ...windowView(window, rule, codes),
    isCaughtToday: otherKeys && otherKeys.has(keyOf(window)),
  }));
}

/** Today's version beside the trial, and what it alone catches. */
function besides(
  own: Tried,
  other: (Tried & { version: LimitVersion }) | null,
  codes: Codes,
): Pick<LimitTrialAnswer, 'today' | 'onlyToday'> {
  if (!other) return { today: null, onlyToday: [] };
  const ownKeys = new Set(own.caught.map(keyOf));
  const alone = other.caught.filter((window) => !ownKeys.has(keyOf(window)));
  const { limitId, version } = other.version;
  return {
    today: { ...other.summary, limitId, version, caughtAlone: alone.length },
    onlyToday: alone.slice(0, MOST_TRIAL_WINDOWS).map((window) => windowView(window, other.rule, codes)),
  };
}

function windowView(
  { stationId, startSec, endSec, levelDb, coverage }: CaughtWindow,
  { thresholdTenths }: TrialRule,
  codes: Codes,
): TrialWindow {
  return {
    station: codes.get(stationId) ?? String(stationId),
    from: formatInstantUtc(startSec),
    to: formatInstantUtc(endSec),
    level: levelDb,
    above: (toTenths(levelDb) - thresholdTenths) / 10,
    coverage,
  };
}

function keyOf({ stationId, startSec, endSec }: CaughtWindow): string {
  return `${stationId}:${startSec}:${endSec}`;
}
