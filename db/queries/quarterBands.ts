import type { BandFraction } from '#lib/acoustics/bands';
import { BAND_BYTES, unpackBandEnergies } from './aggregatePacking';
import { pool, type Connection } from './connection';

/** What limits on bands look at of a quarter-hour: a few bands of it. */
export interface QuarterBands {
  startSec: number;
  validSec: number;
  bandFraction: BandFraction | null;
  isBandFractionMixed: boolean;
  /** By `bandSlot`; the other bands may be there or not. */
  bandEnergySec: Float64Array;
  bandValidSec: Float64Array;
}

/** The bands lie one after the other without a gap: then the place of each is known. */
const IS_WITHOUT_GAP = `ORD(SUBSTRING(band_energies, -${BAND_BYTES}, 1)) - ORD(band_energies) + 1 = LENGTH(band_energies) / ${BAND_BYTES}`;

/**
 * Some bands, those of the slots `firstSlot` to `lastSlot`, of the computed quarter-hours of a station that begin in
 * `fromSec <= t < toSec`, ascending. Only their bytes are read where that can be: a year in a fraction of the time of whole rows.
 */
export async function selectQuarterBands(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  { firstSlot, lastSlot }: { firstSlot: number; lastSlot: number },
  conn: Connection = pool(),
): Promise<QuarterBands[]> {
  const [rows] = await conn
    .raw(
      `SELECT starts_at, valid_sec, band_fraction,
         IF(ORD(band_energies) <= ? AND ${IS_WITHOUT_GAP},
           SUBSTRING(band_energies, (? - ORD(band_energies)) * ${BAND_BYTES} + 1, ?), band_energies)
       FROM quarter_hours WHERE station_id = ? AND starts_at >= ? AND starts_at < ? ORDER BY starts_at`,
      [firstSlot, firstSlot, (lastSlot - firstSlot + 1) * BAND_BYTES, stationId, fromSec, toSec],
    )
    .options({ rowsAsArray: true });
  return (rows as [number, number, BandFraction | null, Buffer][]).map(
    ([startSec, validSec, bandFraction, bytes]) => ({
      startSec,
      validSec,
      bandFraction,
      ...unpackBandEnergies(bytes),
    }),
  );
}
