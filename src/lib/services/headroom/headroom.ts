import { pool, type Connection } from '#db/queries/connection';
import { listLimitVersions, type LimitMetric } from '#db/queries/limits';
import { listSettings, pickSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { energyOfDb } from '#lib/acoustics/energy';
import {
  headingDb,
  headroomDb,
  isCertainToPass,
  secondsUntilCertain,
  type WindowSoFar,
} from '#lib/acoustics/headroom';
import { isSureToBeDismissed } from '#lib/acoustics/windRule';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Headroom, LimitHeadroom } from '#lib/contracts/headroom';
import { limitMetricText } from '#lib/format/limitMetric';
import { windRuleText } from '#lib/format/windRule';
import type { JudgedWindow } from '#lib/services/limits/force';
import { isAbove, measure, minimumFor } from '#lib/services/limits/measure';
import { HeadroomEvidence } from './evidence';
import { openWindows } from './openWindows';
import { secondsOf, type WindowSeconds } from './windowSeconds';

/** Quantities that a rest of the window adds to in a way that can be foretold. */
const FORETOLD: readonly LimitMetric[] = ['LAeq', 'LAFmax', 'bandLeq', 'bandGroupLeq'];
/** A level of the last 15 minutes stands on at least so much of them. */
const LEAST_RECENT_SEC = 300;

/** How loud the rest may be of every window that a limit in force has open at a station. */
export async function stationHeadroom(
  station: StationRow,
  nowSec: number,
  conn: Connection = pool(),
): Promise<Headroom> {
  const timeline = await listSettings(station.networkId, conn);
  const versions = await listLimitVersions(station.networkId, conn);
  const windows = openWindows(versions, station.id, nowSec, timeline);
  const at = formatInstantUtc(nowSec);
  if (windows.length === 0) return { at, items: [] };
  const evidence = await HeadroomEvidence.read(station, timeline, nowSec, conn);
  const items: LimitHeadroom[] = [];
  for (const window of windows) items.push(await headroomOf(window, evidence));
  return { at, items };
}

async function headroomOf(window: JudgedWindow, evidence: HeadroomEvidence): Promise<LimitHeadroom> {
  const { version, startSec, endSec } = window;
  const { nowSec, newestSec } = evidence;
  const { windRule } = version;
  const { sums, wind } = await evidence.sums({ fromSec: startSec, toSec: nowSec }, windRule);
  const isForetold = FORETOLD.includes(version.metric);
  const { levelDb, validSec } = isForetold
    ? measure(version, sums)
    : { levelDb: null, validSec: sums.validSec };
  const minimumCoverage = minimumFor(version, pickSettings(evidence.timeline, startSec));
  const seconds = secondsOf(window, { nowSec, newestSec, validSec, minimumCoverage });
  const told = {
    limit: {
      id: version.limitId,
      version: version.version,
      name: version.name,
      metric: version.metric,
      descriptor: limitMetricText(version),
      threshold: version.thresholdTenths / 10,
    },
    from: formatInstantUtc(startSec),
    to: formatInstantUtc(endSec),
    level: levelDb,
    windWords: windRule && windRuleText(windRule),
    seconds: seconds.told,
  };
  if (version.stepMin !== null || !isForetold) return { ...told, ...NO_FINDINGS, state: 'not-foretold' };
  if (windRule && wind && isSureToBeDismissed(windRule, wind, endSec - seconds.restFromSec))
    return { ...told, ...NO_FINDINGS, state: 'dismissed' };
  if (version.metric === 'LAFmax') return { ...told, ...ofMaximum(window, levelDb) };
  return { ...told, ...(await ofMean(window, levelDb, seconds, evidence)) };
}

type Findings = Pick<LimitHeadroom, 'state' | 'headroom' | 'heading' | 'usualHigh' | 'earliestPassing'>;
const NO_FINDINGS = { headroom: null, heading: null, usualHigh: null, earliestPassing: null } as const;

/** A maximum has no mean to make up for: one moment above the limit passes it. */
function ofMaximum({ version }: JudgedWindow, levelDb: number | null): Findings {
  if (isAbove(version, levelDb)) return { ...NO_FINDINGS, state: 'passed' };
  const headroom = version.thresholdTenths / 10;
  return { ...NO_FINDINGS, state: levelDb === null ? 'no-data' : 'open', headroom };
}

async function ofMean(
  { version, endSec }: JudgedWindow,
  levelDb: number | null,
  { restFromSec, told: { valid, needed } }: WindowSeconds,
  evidence: HeadroomEvidence,
): Promise<Findings> {
  const { thresholdTenths } = version;
  const restSec = endSec - restFromSec;
  if (restSec < needed) return { ...NO_FINDINGS, state: 'not-compared' };
  const energySec = levelDb === null ? 0 : energyOfDb(levelDb) * valid;
  const soFar: WindowSoFar = { energySec, validSec: valid, restSec };
  const heading = await headingOf(version, soFar, levelDb, evidence);
  if (isCertainToPass(thresholdTenths, soFar)) return { ...NO_FINDINGS, state: 'certain', heading };
  const usualHigh =
    version.metric === 'LAeq' && version.windRule === null
      ? await evidence.usualHighDb({ fromSec: restFromSec, toSec: endSec })
      : null;
  const untilSec = usualHigh === null ? null : secondsUntilCertain(thresholdTenths, soFar, usualHigh);
  const earliestSec = untilSec === null ? null : Math.max(evidence.nowSec, Math.ceil(restFromSec + untilSec));
  return {
    state: levelDb === null ? 'no-data' : 'open',
    headroom: headroomDb(thresholdTenths, soFar),
    heading,
    usualHigh,
    earliestPassing: earliestSec === null ? null : formatInstantUtc(earliestSec),
  };
}

async function headingOf(
  version: JudgedWindow['version'],
  soFar: WindowSoFar,
  levelDb: number | null,
  evidence: HeadroomEvidence,
): Promise<LimitHeadroom['heading']> {
  const recentSums = await evidence.recentSums(version.windRule);
  const recent = recentSums && measure(version, recentSums.sums);
  if (recent && recent.levelDb !== null && recent.validSec >= LEAST_RECENT_SEC) {
    const level = headingDb(soFar, recent.levelDb);
    return level === null ? null : { level, from: 'last-15-min' };
  }
  return levelDb === null ? null : { level: levelDb, from: 'so-far' };
}
