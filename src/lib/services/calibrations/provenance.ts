import { type StationRow } from '#db/queries/stations';
import { type Doubt } from '#lib/contracts/calibrations';
import { type PeriodInstrument } from '#lib/contracts/periodInstruments';
import { doubtJson, doubtsOf } from './doubts';
import { madeBy } from './madeBy';

/** What measured a station's period, and what is doubtful about it. */
export interface Provenance {
  instruments: PeriodInstrument[];
  doubts: Doubt[];
}

/** Instruments that stood at a station in a period (epoch seconds, half-open), and the doubtful stretches that it touches. */
export async function provenanceOf(
  station: Pick<StationRow, 'id' | 'networkId'>,
  fromSec: number,
  toSec: number,
): Promise<Provenance> {
  const [instruments, doubts] = await Promise.all([
    madeBy(station, { fromSec, toSec }),
    doubtsOf(station.networkId),
  ]);
  return {
    instruments,
    doubts: doubts
      .filter(
        (one) =>
          one.stationId === station.id && one.fromSec < toSec && (one.toSec === null || one.toSec > fromSec),
      )
      .map(doubtJson),
  };
}
