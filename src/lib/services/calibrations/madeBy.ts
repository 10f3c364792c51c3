import { listCalibrations, type CalibrationRow } from '#db/queries/calibrations';
import { pool, type Connection } from '#db/queries/connection';
import { selectStaysAt } from '#db/queries/deployments';
import { findInstrument } from '#db/queries/instruments';
import { type StationRow } from '#db/queries/stations';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { formatInstantUtc } from '#lib/contracts/common';
import { type PeriodInstrument } from '#lib/contracts/periodInstruments';
import { type Span } from '../levels/spans';
import { driftCentiDb, goodness } from './calibrationJson';

/**
 * The instruments that made a station's figures of a period (epoch seconds, half-open), in order of time, each with its part of
 * the period and its latest check before that part's end.
 */
export async function madeBy(
  station: Pick<StationRow, 'id' | 'networkId'>,
  { fromSec, toSec }: Span,
  conn: Connection = pool(),
): Promise<PeriodInstrument[]> {
  const made: PeriodInstrument[] = [];
  for (const stay of await selectStaysAt(station.id, fromSec, toSec, conn)) {
    const instrument = await findInstrument(station.networkId, stay.instrumentId, conn);
    if (!instrument) continue;
    const endSec = Math.min(toSec, stay.endSec ?? toSec);
    made.push({
      id: instrument.id,
      serialNumber: instrument.serialNumber,
      class: instrument.class,
      description: instrument.description,
      microphone: instrument.microphone,
      from: formatInstantUtc(Math.max(fromSec, stay.startSec)),
      to: formatInstantUtc(endSec),
      lastCheck: lastCheck(await listCalibrations(station.networkId, instrument.id, conn), endSec),
    });
  }
  return made;
}

/** Of checks, latest first, the latest standing one before an instant. */
function lastCheck(checks: readonly CalibrationRow[], beforeSec: number): PeriodInstrument['lastCheck'] {
  const check = checks.find(
    ({ withdrawnAt, checkedAtSec }) => withdrawnAt === null && checkedAtSec < beforeSec,
  );
  if (!check) return null;
  return {
    at: formatInstantUtc(check.checkedAtSec),
    drift: centiDbToDb(driftCentiDb(check)),
    isWithinBound: goodness(check).isGoodBefore,
  };
}
