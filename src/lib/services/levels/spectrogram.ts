import { setImmediate as nextTurn } from 'node:timers/promises';
import { pool, type Connection } from '#db/queries/connection';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { bandSlot, bandsOf, BAND_SLOTS } from '#lib/acoustics/bands';
import { FLAG_NAMES, INVALIDITY_REASONS } from '#lib/acoustics/validity';
import { type SpectrogramColumns } from '#lib/contracts/spectrogramBinary';
import { keptFromSecOf } from '../retention/kept';
import { planColumns } from './columnPlan';
import { emptyColumns, type Columns } from './columns';
import { currentQuarters } from './currentQuarters';
import { fillFromIntervals } from './intervalColumns';
import { judgementOf, type LevelSource } from './intervalSums';
import { PercentileBlocks } from './percentileBlocks';
import { fillFromQuarters } from './quarterColumns';
import { withoutSpans, type Span } from './spans';

export interface SpectrogramQuery extends Span {
  station: Pick<
    StationRow,
    'id' | 'networkId' | 'intervalSec' | 'bandFraction' | 'firstBandIndex' | 'lastBandIndex'
  >;
  /** The most columns wanted; the steps are the finest that need no more. */
  mostColumns: number;
  /** Whether LA10, LA50 and LA90 are wanted beside the columns. */
  percentiles?: boolean;
  /** The network's settings in order of their beginning; read when left out. */
  timeline?: NetworkSettings[];
}

/** Intervals that are held in memory at once: more of them outlive a young generation, and collecting them takes most of the time. */
const MOST_INTERVALS = 3000;
/** Quarter-hours that are held in memory at once: two months. */
const MOST_QUARTERS = 6000;

/** A station's levels over time in equal steps, of the station's bands. */
export async function spectrogram(
  query: SpectrogramQuery,
  conn: Connection = pool(),
): Promise<SpectrogramColumns> {
  const { station, mostColumns } = query;
  const timeline = query.timeline ?? (await listSettings(station.networkId, conn));
  const plan = planColumns(query, station.intervalSec, mostColumns, await keptFromSecOf(station.id, conn));
  const bands = bandsOf(station.bandFraction).filter(
    ({ index }) => station.firstBandIndex <= index && index <= station.lastBandIndex,
  );
  const placeOfSlot = new Int8Array(BAND_SLOTS).fill(-1);
  bands.forEach(({ index }, place) => (placeOfSlot[bandSlot(index)] = place));
  const columns = emptyColumns(plan, bands, placeOfSlot);
  const source: LevelSource = { station, timeline, validity: 'rules' };
  const blocks = query.percentiles ? new PercentileBlocks(plan, station.intervalSec) : null;
  if (plan.source === 'intervals') await readIntervals(source, columns, conn);
  else await readQuarters(source, columns, blocks, conn);
  if (blocks) {
    const isRead = plan.source === 'quarter-hours';
    for (const span of withoutSpans(blocks.span, isRead ? [spanOf(columns)] : [])) {
      blocks.add(await currentQuarters(source, span, { bands: false }, conn));
    }
  }
  const percentiles = blocks?.columns() ?? null;
  return {
    ...columns,
    percentiles,
    header: {
      from: plan.fromSec,
      stepSeconds: plan.stepSec,
      columns: plan.count,
      bandFraction: station.bandFraction,
      bands: bands.map(({ nominalHz }) => nominalHz),
      timeZone: pickSettings(timeline, query.fromSec).timeZone,
      source: plan.source,
      reasons: [...INVALIDITY_REASONS],
      flags: [...FLAG_NAMES],
      ...(percentiles && { percentileSeconds: percentiles.blockSec }),
    },
  };
}

async function readIntervals(source: LevelSource, columns: Columns, conn: Connection): Promise<void> {
  const { station } = source;
  const judgement = await judgementOf(source, spanOf(columns), conn);
  const parts = partsOf(columns, MOST_INTERVALS * station.intervalSec);
  const read = (at: number) => {
    const part = parts[at];
    return part && selectMeasuredIntervals(station.id, part.fromSec, part.toSec, conn);
  };
  // The database reads the next part while this process fills columns from the one before.
  let reading = read(0);
  for (const [at, part] of parts.entries()) {
    const intervals = (await reading) ?? [];
    reading = read(at + 1);
    // Told when it is awaited; until then a failure that nobody hears would end the process.
    reading?.catch(() => undefined);
    await nextTurn();
    fillFromIntervals(columns, intervals, part, judgement);
  }
}

async function readQuarters(
  source: LevelSource,
  columns: Columns,
  blocks: PercentileBlocks | null,
  conn: Connection,
): Promise<void> {
  for (const part of partsOf(columns, MOST_QUARTERS * 900)) {
    const quarters = await currentQuarters(source, part, { bands: true }, conn);
    fillFromQuarters(columns, quarters);
    blocks?.add(quarters);
  }
}

function spanOf({ plan }: Columns): Span {
  return { fromSec: plan.fromSec, toSec: plan.fromSec + plan.count * plan.stepSec };
}

/** The columns' time in parts of whole columns that last about `mostSec`. */
function partsOf(columns: Columns, mostSec: number): Span[] {
  const { stepSec } = columns.plan;
  const partSec = Math.max(1, Math.floor(mostSec / stepSec)) * stepSec;
  const whole = spanOf(columns);
  const parts: Span[] = [];
  for (let { fromSec } = whole; fromSec < whole.toSec; fromSec += partSec) {
    parts.push({ fromSec, toSec: Math.min(fromSec + partSec, whole.toSec) });
  }
  return parts;
}
