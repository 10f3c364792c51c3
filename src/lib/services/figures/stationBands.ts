import { bandSlot, bandsOf, type Band, type BandFraction } from '#lib/acoustics/bands';
import { octaveIndexOf } from '#lib/acoustics/octaves';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type SheetSource } from './source';

/** A band with its place in arrays by band. */
export interface PlacedBand extends Band {
  slot: number;
}

/** Whether the period's bands are octaves or thirds: what was measured, else what the station is registered with. */
export function fractionOf(
  { bandFraction }: Pick<SheetSource['station'], 'bandFraction'>,
  { sums }: PeriodAccumulator,
): BandFraction {
  return sums.bandFraction ?? bandFraction;
}

/** The bands between the lowest and the highest that the station is registered with or that has a level. */
export function stationBands(
  station: Pick<SheetSource['station'], 'bandFraction' | 'firstBandIndex' | 'lastBandIndex'>,
  levels: PeriodAccumulator,
): PlacedBand[] {
  return bandsOf(fractionOf(station, levels))
    .map((band) => ({ ...band, slot: bandSlot(band.index) }))
    .filter(
      ({ index, slot }) =>
        (station.firstBandIndex <= index && index <= station.lastBandIndex) ||
        (levels.sums.bandValidSec[slot] ?? 0) > 0,
    );
}

/** The octaves of those bands. */
export function stationOctaves(station: SheetSource['station'], levels: PeriodAccumulator): PlacedBand[] {
  const bands = stationBands(station, levels);
  if (fractionOf(station, levels) === 1) return bands;
  const indices = new Set(bands.map(({ index }) => octaveIndexOf(index)));
  return bandsOf(1)
    .filter(({ index }) => indices.has(index))
    .map((band) => ({ ...band, slot: bandSlot(band.index) }));
}
