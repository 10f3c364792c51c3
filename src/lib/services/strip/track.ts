import { listComplaints } from '#db/queries/complaints';
import { type StationRow } from '#db/queries/stations';
import { type BandFraction } from '#lib/acoustics/bands';
import { type ComplaintKind } from '#lib/contracts/complaints';
import { limitUnit, type LimitUnit } from '#lib/format/limitMetric';
import { type Span } from '#lib/services/levels/spans';
import { exceedancesOfStation, limitsOfStation, type LimitInForce } from './marks';

/** A strip as the page hands it to the browser: its station, and what is marked on it. */
export interface StripTrack {
  station: { code: string; name: string; bandFraction: BandFraction; intervalSec: number };
  /** How much later its time is than the axis's. */
  shiftSec: number;
  limits: LimitInForce[];
  exceedances: {
    id: number;
    fromSec: number;
    toSec: number;
    limitName: string;
    levelDb: number;
    thresholdDb: number;
    unit: LimitUnit;
    isStanding: boolean;
  }[];
  /** Those that the station is the nearest to, without anything personal. */
  complaints: { reference: string; kind: ComplaintKind; fromSec: number; toSec: number }[];
}

const MOST_COMPLAINTS = 1000;
const LEAST_AROUND_SEC = 7 * 86_400;

/** A station's strip for a period of the axis. Exceedances and complaints are marked well beyond the period, for panning and zooming out. */
export async function stripTrack(station: StationRow, period: Span, shiftSec = 0): Promise<StripTrack> {
  const aroundSec = Math.max(LEAST_AROUND_SEC, 2 * (period.toSec - period.fromSec));
  const around = {
    fromSec: period.fromSec + shiftSec - aroundSec,
    toSec: period.toSec + shiftSec + aroundSec,
  };
  const [limits, exceedances, complaints] = await Promise.all([
    limitsOfStation(station.networkId, station.id),
    exceedancesOfStation(station.id, around),
    listComplaints(station.networkId, { ...around, nearestStationId: station.id, limit: MOST_COMPLAINTS }),
  ]);
  const { code, name, bandFraction, intervalSec } = station;
  return {
    station: { code, name, bandFraction, intervalSec },
    shiftSec,
    limits,
    exceedances: exceedances.map((one) => ({
      id: one.id,
      fromSec: one.startsAtSec,
      toSec: one.endsAtSec,
      limitName: one.limitName,
      levelDb: one.levelDb,
      thresholdDb: one.thresholdTenths / 10,
      unit: limitUnit(one.metric),
      isStanding: one.state === 'standing',
    })),
    complaints: complaints
      .map(({ reference, kind, startsAtSec, endsAtSec }) => ({
        reference,
        kind,
        fromSec: startsAtSec,
        toSec: endsAtSec,
      }))
      .sort((a, b) => a.fromSec - b.fromSec),
  };
}
