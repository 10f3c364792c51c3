import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertPlacement } from '#db/queries/stationPlacements';
import { findStationById, updateStation, type StationRow } from '#db/queries/stations';
import { bandAt, bandByNominalHz } from '#lib/acoustics/bands';
import { flagMask } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { bandRangeIssues, type StationChanges } from '#lib/contracts/stations';
import { placementChange } from './placementChange';

export type StationChange =
  | { outcome: 'changed'; station: StationRow }
  | { outcome: 'refused'; fields: { field: string; message: string }[] };

type Row = Partial<Omit<StationRow, 'id' | 'networkId' | 'createdAt'>>;

/** Changes what was given and leaves the rest; the audit entry holds what changed, before and after. */
export async function changeStation(
  station: StationRow,
  changes: StationChanges,
  userId: string,
): Promise<StationChange> {
  const issues = bandRangeIssues({
    bandFraction: station.bandFraction,
    firstBandHz: changes.firstBandHz ?? bandAt(station.bandFraction, station.firstBandIndex).nominalHz,
    lastBandHz: changes.lastBandHz ?? bandAt(station.bandFraction, station.lastBandIndex).nominalHz,
  });
  if (issues.length > 0) {
    return { outcome: 'refused', fields: issues.map(({ path: [field], message }) => ({ field, message })) };
  }
  const after = differing(station, rowOf(station, changes));
  if (Object.keys(after).length === 0) return { outcome: 'changed', station };
  const placement = await placementChange(station, after, changes.placementFrom ?? null);
  if (placement.outcome === 'refused') return placement;
  const before = Object.fromEntries(Object.keys(after).map((key) => [key, station[key as keyof Row]]));
  return inTransaction(async (transaction) => {
    await updateStation(station.id, after, transaction);
    for (const row of placement.rows) await insertPlacement(station.id, row, userId, transaction);
    const { networkId } = station;
    const action = changes.retired === undefined ? 'station.change' : retirement(changes.retired);
    const subject = `station ${station.code}`;
    const from = placement.rows.at(-1)?.effectiveFromSec;
    const detail = {
      before,
      after,
      ...(from !== undefined && { placementFrom: formatInstantUtc(from) }),
      ...(changes.reason !== undefined && { reason: changes.reason }),
    };
    await appendAudit({ userId, networkId, action, subject, detail }, transaction);
    const changed = await findStationById(station.id, transaction);
    return { outcome: 'changed', station: changed ?? station };
  });
}

const retirement = (isRetired: boolean) => (isRetired ? 'station.retire' : 'station.bring-back');

function rowOf(station: StationRow, changes: StationChanges): Row {
  const indexOf = (hz: number | undefined) =>
    hz === undefined ? undefined : bandByNominalHz(station.bandFraction, hz)?.index;
  const { retired } = changes;
  return {
    name: changes.name,
    latitude: changes.latitude,
    longitude: changes.longitude,
    intervalSec: changes.intervalSeconds,
    firstBandIndex: indexOf(changes.firstBandHz),
    lastBandIndex: indexOf(changes.lastBandHz),
    placement: changes.placement,
    facadeCorrectionDb: changes.facadeCorrection,
    mastHeightM: changes.mastHeight,
    surroundings: changes.surroundings,
    acceptsFromSec: changes.acceptsFrom,
    expectedFlags: changes.expectedFlags && flagMask(changes.expectedFlags),
    retiredAt: retired === undefined ? undefined : retired ? (station.retiredAt ?? new Date()) : null,
  };
}

/** Of the values given, those that differ from what the station has. */
function differing(station: StationRow, row: Row): Row {
  return Object.fromEntries(
    Object.entries(row).filter(([key, value]) => value !== undefined && value !== station[key as keyof Row]),
  );
}
