import { pool } from '#db/queries/connection';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { coverageUncertaintyDb, periodUncertainty } from '#lib/acoustics/uncertainty';
import { civilHours } from '../figures/civilHours';
import { instrumentsOf } from '../figures/instruments';
import type { PeriodFigures } from '../levels/figures';
import { QuarterSeries } from '../levels/quarterSeries';

export interface StationUncertainty {
  /** U = 2u of LAeq, dB; null where gaps cannot be told. */
  expandedDb: number | null;
  basis: string;
}

/** Expanded uncertainty of a window's LAeq: class of the instrument, drift by its checks, gaps by the hourly energies. */
export async function stationUncertainty(
  station: StationRow,
  figures: PeriodFigures,
  { timeline, timeZone, nowSec }: { timeline: NetworkSettings[]; timeZone: string; nowSec: number },
): Promise<StationUncertainty> {
  if (figures.levels.sums.validSec === 0) return { expandedDb: null, basis: 'no valid data' };
  const period = { fromSec: figures.fromSec, toSec: figures.toSec };
  const instruments = await instrumentsOf({ station, period, timeZone, conn: pool() });
  const elapsed = { ...period, toSec: Math.min(period.toSec, nowSec) };
  const energies = figures.coverage === 1 ? [] : await hourlyEnergies(station, elapsed, timeline, timeZone);
  const coverageDb = coverageUncertaintyDb(energies, figures.coverage);
  const { driftDb } = instruments.drift;
  const found = periodUncertainty({ instrumentDb: instruments.uncertaintyDb, driftDb, coverageDb });
  if (!found) return { expandedDb: null, basis: 'with gaps it takes at least two hours with data' };
  const gaps = found.terms.coverageDb.toFixed(2);
  return {
    expandedDb: found.expandedDb,
    basis:
      `U = 2u; instrument ${instruments.uncertaintyDb} dB (${instruments.basis}), calibration drift ${driftDb.toFixed(2)} dB, ` +
      `gaps ${gaps} dB; site, weather and source are not in it`,
  };
}

async function hourlyEnergies(
  station: StationRow,
  period: { fromSec: number; toSec: number },
  timeline: NetworkSettings[],
  timeZone: string,
): Promise<number[]> {
  const series = await QuarterSeries.read({ station, timeline, validity: 'rules' }, period, pool());
  const energies: number[] = [];
  for (const hour of civilHours(period, timeZone)) {
    const { sums } = await series.levels(hour);
    if (sums.validSec > 0) energies.push(sums.aEnergySec / sums.validSec);
  }
  return energies;
}
