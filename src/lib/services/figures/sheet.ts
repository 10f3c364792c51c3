import { pool, type Connection } from '#db/queries/connection';
import { listSettings, pickSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type FigureSheet } from '#lib/contracts/figureSheet';
import { exclusionPage } from '../exclusions/list';
import { dateSettings, datePeriods } from '../levels/datePeriods';
import { periodFigures } from '../levels/figures';
import { incidentOf } from '../levels/incident';
import { QuarterSeries } from '../levels/quarterSeries';
import { type Span } from '../levels/spans';
import { keptFromSecOf, onQuarters } from '../retention/kept';
import { periodWind, periodWindWords } from '../weather/periodWind';
import { statisticsOf } from '../levels/statistics';
import { addDays } from '#lib/time/zone';
import { assessmentRows } from './assessmentRows';
import { bandHoursOf } from './bandHours';
import { bandRows, octaveRows } from './bandRows';
import { cautionsOf } from './cautions';
import { compareWithRaw } from './comparison';
import { dateRows, datesTouched, usesCnel } from './dates';
import { distributionOf } from './distribution';
import { headOf } from './head';
import { heatMapOf, measuredHours } from './heatMap';
import { instrumentsOf } from './instruments';
import { isReadable, notReadWords, readIntervals } from './intervalPass';
import { EXCEEDANCE_CONVENTION, levelRows } from './levelRows';
import { periodsByClock, periodsByDate } from './periodsOfDay';
import { byHourOfDay, byWeekday } from './pooled';
import { type RatingEntry } from './ratingForm';
import { type SheetSource } from './source';
import { fractionOf } from './stationBands';
import { tonalityOf } from './tonality';

/** Longest period that has figures here: a year, whose dates and hours are told one by one. */
const LONGEST_SEC = 370 * 86_400;
const MOST_EXCLUSIONS = 200;

export interface SheetQuery extends Span {
  networkSlug: string;
  station: StationRow;
  /** Adjustments and background that a person entered. */
  rating: RatingEntry;
  /** Epoch seconds; a period counts as elapsed up to here. */
  nowSec: number;
}

/** Whether a period is longer than the page can tell. */
export function isTooLong({ fromSec, toSec }: Span): boolean {
  return toSec - fromSec > LONGEST_SEC;
}

/** Every figure of one station and period. @throws RangeError for a period that is too long. */
export async function figureSheet(query: SheetQuery, conn: Connection = pool()): Promise<FigureSheet> {
  if (isTooLong(query)) throw new RangeError('Figures are told of a year at most.');
  const source = await sourceOf(query, conn);
  const { station, period, timeline, timeZone, nowSec } = source;
  const figures = await periodFigures(
    { station, ...period, timeline, nowSec },
    { bandPercentiles: true },
    conn,
  );
  const { levels } = figures;
  const statistics = statisticsOf(figures, { station });
  const pass = isReadable(source) ? await readIntervals(source) : null;
  const hours = await measuredHours(source);
  const instruments = await instrumentsOf(source);
  const incident = await incidentOf({ station, ...period, timeline, nowSec }, statistics.LAeq, conn);
  const wind = pass ? periodWindWords(await periodWind(station.id, period, conn)) : null;
  const dates = await dateRows(source);
  const notRead = pass ? null : notReadWords(source);
  return {
    network: query.networkSlug,
    station: { code: station.code, name: station.name },
    bandFraction: fractionOf(station, levels),
    from: statistics.from,
    to: statistics.to,
    timeZone,
    seconds: figures.seconds,
    coverage: figures.coverage,
    meetsMinimum: figures.meetsMinimum,
    minimumCoverage: figures.minimumCoverage,
    sampleSeconds: statistics.sampleSeconds,
    head: headOf(source, figures, { intervals: pass?.facts ?? null, instruments, incident, wind }),
    intervals: pass?.facts ?? null,
    intervalsMissing: notRead,
    exclusions: await standingExclusions(source),
    levels: levelRows(source, figures, statistics, incident),
    exceedanceConvention: EXCEEDANCE_CONVENTION,
    assessments: assessmentRows(source, figures, statistics, hours, query.rating, instruments),
    tonality: tonalityOf(source, levels, pass?.tones.result() ?? null),
    comparison: pass && compareWithRaw(levels, pass.raw),
    dates,
    hasCnel: usesCnel(source, dates),
    byClock: await periodsByClock(source),
    byDate: await periodsByDate(source),
    bands: bandRows(source, levels),
    octaves: octaveRows(source, levels),
    distribution: distributionOf(levels.sums.aClasses, levels.sums.sampleSec),
    heatMap: heatMapOf(source, hours),
    bandHours: await bandHoursOf(source, levels),
    byHour: byHourOfDay(hours, source.minimumCoverage),
    byWeekday: byWeekday(hours, source.minimumCoverage),
    cautions: cautionsOf(statistics, pass?.facts ?? null),
  };
}

async function sourceOf(
  { station, fromSec, toSec, nowSec }: SheetQuery,
  conn: Connection,
): Promise<SheetSource> {
  const timeline = await listSettings(station.networkId, conn);
  const { timeZone, minimumCoverage } = pickSettings(timeline, fromSec);
  const keptFromSec = await keptFromSecOf(station.id, conn);
  const period = onQuarters({ fromSec, toSec }, keptFromSec);
  const { fromDate, toDate } = datesTouched({ period, timeZone });
  const lastNightEndSec = datePeriods(addDays(toDate, -1), timeline).at(-1)?.toSec ?? toSec;
  const span = {
    fromSec: Math.min(fromSec, dateSettings(fromDate, timeline).midnightSec),
    toSec: Math.max(toSec, dateSettings(toDate, timeline).midnightSec, lastNightEndSec),
  };
  const series = await QuarterSeries.read({ station, timeline, validity: 'rules' }, span, conn);
  return { station, period, timeline, timeZone, minimumCoverage, nowSec, series, keptFromSec, conn };
}

async function standingExclusions({ station, period }: SheetSource): Promise<FigureSheet['exclusions']> {
  const { items } = await exclusionPage({
    networkId: station.networkId,
    stationId: station.id,
    ...period,
    limit: MOST_EXCLUSIONS,
    cursor: null,
  });
  return items
    .filter(({ withdrawal }) => withdrawal === null)
    .map(({ from, to, reason }) => ({ from, to, reason }));
}
