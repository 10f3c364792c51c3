import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertPlantFinding, listPlantFindings } from '#db/queries/plantFindings';
import { findPlant } from '#db/queries/plants';
import { type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type NewPlantFinding, type PlantFinding } from '#lib/contracts/plantCandidates';
import { done, invalid, type Outcome } from '../outcome';
import { plantCandidates } from './candidates';
import { plantFindingJson } from './plantJson';

/**
 * Keeps what a person says about a plant as the source of what a station measured in a period, with the words that named it
 * then. A later finding stands beside the earlier ones.
 */
export async function decideOnPlant(
  station: StationRow,
  input: NewPlantFinding,
  { userId, nowSec }: { userId: string; nowSec: number },
): Promise<Outcome<PlantFinding>> {
  const { networkId } = station;
  const plant = await findPlant(networkId, input.plant);
  if (!plant) return invalid('plant', 'is not a plant of this network');
  const period = { fromSec: input.from, toSec: input.to };
  const { candidates } = await plantCandidates(station, period, nowSec);
  const namedBecause = (candidates.find((one) => one.plant === plant.id)?.reason ?? '').slice(0, 1000);
  return inTransaction<Outcome<PlantFinding>>(async (transaction) => {
    const { verdict, note } = input;
    const id = await insertPlantFinding(
      {
        networkId,
        stationId: station.id,
        ...period,
        plantId: plant.id,
        plantVersion: plant.version,
        verdict,
        namedBecause,
        note,
        decidedBy: userId,
      },
      transaction,
    );
    const detail = {
      plant: plant.id,
      version: plant.version,
      station: station.code,
      from: formatInstantUtc(period.fromSec),
      to: formatInstantUtc(period.toSec),
      namedBecause,
      note,
    };
    const subject = `plant ${plant.name}`;
    const action = verdict === 'confirmed' ? 'plant.confirm' : 'plant.reject';
    const row = (await listPlantFindings(station.id, period, transaction)).find((one) => one.id === id);
    if (!row) throw new Error(`Finding ${id} is not there.`);
    await appendAudit({ userId, networkId, action, subject, detail }, transaction);
    return done(plantFindingJson(row));
  });
}
