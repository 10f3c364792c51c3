import { listPlacements, type PlacementRow } from '#db/queries/stationPlacements';
import { type StationRow } from '#db/queries/stations';

export type PlacementChange =
  | { outcome: 'dated'; rows: PlacementRow[] }
  | { outcome: 'refused'; fields: { field: string; message: string }[] };

/**
 * The dated rows that a change of placement or façade correction takes: the new one from `fromSec` on (null: from now on), after
 * how it has stood so far where nothing says so yet. None where neither changes. Figures of before keep what held then.
 */
export async function placementChange(
  station: StationRow,
  after: Partial<Pick<StationRow, 'placement' | 'facadeCorrectionDb'>>,
  fromSec: number | null,
): Promise<PlacementChange> {
  const isChanged = after.placement !== undefined || after.facadeCorrectionDb !== undefined;
  if (!isChanged) return { outcome: 'dated', rows: [] };
  const nowSec = Math.floor(Date.now() / 1000);
  const effectiveFromSec = fromSec ?? nowSec;
  const before = await listPlacements(station);
  if (effectiveFromSec > nowSec) return refused('must not be in the future');
  if (effectiveFromSec < (before.at(-1)?.effectiveFromSec ?? 0)) {
    return refused('must not be before the latest change of the microphone’s place');
  }
  const changed: PlacementRow = {
    effectiveFromSec,
    placement: after.placement ?? station.placement,
    facadeCorrectionDb: after.facadeCorrectionDb ?? station.facadeCorrectionDb,
  };
  return { outcome: 'dated', rows: before.length === 1 ? [...before, changed] : [changed] };
}

const refused = (message: string): PlacementChange => ({
  outcome: 'refused',
  fields: [{ field: 'placementFrom', message }],
});
