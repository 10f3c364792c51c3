import { selectStaysAt } from '#db/queries/deployments';
import { type StationRow } from '#db/queries/stations';
import { type Doubt } from '#lib/contracts/calibrations';
import { doubtJson, doubtsOf } from './doubts';

/** What measured a station's period, and what is doubtful about it. */
export interface Provenance {
  instruments: { id: number; serialNumber: string }[];
  doubts: Doubt[];
}

/** Instruments that stood at a station in a period (epoch seconds, half-open), and the doubtful stretches that it touches. */
export async function provenanceOf(
  station: Pick<StationRow, 'id' | 'networkId'>,
  fromSec: number,
  toSec: number,
): Promise<Provenance> {
  const [stays, doubts] = await Promise.all([
    selectStaysAt(station.id, fromSec, toSec),
    doubtsOf(station.networkId),
  ]);
  const byId = new Map(stays.map(({ instrumentId, serialNumber }) => [instrumentId, serialNumber]));
  return {
    instruments: [...byId].map(([id, serialNumber]) => ({ id, serialNumber })),
    doubts: doubts
      .filter(
        (one) =>
          one.stationId === station.id && one.fromSec < toSec && (one.toSec === null || one.toSec > fromSec),
      )
      .map(doubtJson),
  };
}
