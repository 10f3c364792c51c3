import { type PackedSpectrogram } from '#lib/contracts/monthEvidence';
import { formatInstantUtc } from '#lib/contracts/common';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { stationBands } from '../../figures/stationBands';
import { type MonthEvidence } from './evidence';
import { bandHours } from './hours';

const COLUMN_SEC = 3600;
const FIRST_DB = -20;
const STEP_DB = 0.5;
const MOST_CODE = 255;

/** Levels of bands hour by hour, packed; null where the month has no band levels, or octaves and thirds mixed. */
export function packedSpectrogram(
  evidence: MonthEvidence,
  month: PeriodAccumulator,
): PackedSpectrogram | null {
  const { station, span } = evidence;
  if (month.sums.bandFraction === null) return null;
  const bands = stationBands(station, month);
  const columns = bandHours(evidence, span, COLUMN_SEC);
  const codes = new Uint8Array(columns.length * bands.length);
  columns.forEach((column, at) => {
    bands.forEach(({ index }, place) => {
      codes[at * bands.length + place] = codeOf(column.bandLeqDb(index));
    });
  });
  return {
    from: formatInstantUtc(span.fromSec),
    columnSeconds: COLUMN_SEC,
    columns: columns.length,
    bandsHz: bands.map(({ nominalHz }) => nominalHz),
    firstDb: FIRST_DB,
    stepDb: STEP_DB,
    codes: Buffer.from(codes).toString('base64'),
  };
}

function codeOf(levelDb: number | null): number {
  if (levelDb === null) return 0;
  return Math.min(MOST_CODE, Math.max(1, Math.round((levelDb - FIRST_DB) / STEP_DB) + 1));
}
