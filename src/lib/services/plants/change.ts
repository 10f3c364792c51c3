import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  addPlantVersion,
  findPlant,
  lockPlant,
  setPlantRetirement,
  type PlantDetails,
  type PlantRow,
} from '#db/queries/plants';
import { type NewPlantVersion, type Plant } from '#lib/contracts/plants';
import { isDuplicateKey } from '../duplicateKey';
import { done, invalid, type Outcome } from '../outcome';
import { NAME_TAKEN, NO_PLANT } from './add';
import { plantDetails, plantJson } from './plantJson';

/** What was read before the lock was granted must not hide what others have committed meanwhile. */
const SEES_COMMITTED = { isolationLevel: 'read committed' } as const;

export interface PlantAct {
  networkId: number;
  plantId: number;
  userId: string;
}

/** Adds a version of what is noted about a plant; the versions before are kept. Nothing happens where nothing differs. */
export async function changePlant(act: PlantAct, input: NewPlantVersion): Promise<Outcome<Plant>> {
  const { reason, ...details } = input;
  try {
    return await onPlant(act, async (before, transaction) => {
      const after = plantDetails(details);
      const changed = (Object.keys(after) as (keyof PlantDetails)[]).filter(
        (key) => after[key] !== before[key],
      );
      if (changed.length === 0) return done(plantJson(before));
      const note = { reason, createdBy: act.userId };
      await addPlantVersion(before.id, before.version + 1, after, note, transaction);
      const pick = (from: PlantDetails) => Object.fromEntries(changed.map((key) => [key, from[key]]));
      const detail = { before: pick(before), after: pick(after), reason };
      await noteAct(act, before, 'plant.change', detail, transaction);
      return readPlant(act, transaction);
    });
  } catch (error) {
    if (isDuplicateKey(error)) return NAME_TAKEN;
    throw error;
  }
}

/** Takes a plant out of use, or brings it back; it keeps its history, and is not named as a candidate meanwhile. */
export function retirePlant(
  act: PlantAct,
  { retired, reason }: { retired: boolean; reason: string },
): Promise<Outcome<Plant>> {
  return onPlant(act, async (before, transaction) => {
    if (retired === (before.retiredAt !== null)) {
      return invalid('retired', retired ? 'it is out of use already' : 'it is in use already');
    }
    await setPlantRetirement(before.id, { retiredAt: retired ? new Date() : null, reason }, transaction);
    await noteAct(act, before, retired ? 'plant.retire' : 'plant.bring-back', { reason }, transaction);
    return readPlant(act, transaction);
  });
}

function onPlant(
  { networkId, plantId }: PlantAct,
  work: (before: PlantRow, transaction: Connection) => Promise<Outcome<Plant>>,
): Promise<Outcome<Plant>> {
  return inTransaction<Outcome<Plant>>(async (transaction) => {
    await lockPlant(networkId, plantId, transaction);
    const before = await findPlant(networkId, plantId, transaction);
    return before ? work(before, transaction) : NO_PLANT;
  }, SEES_COMMITTED);
}

async function readPlant(act: PlantAct, transaction: Connection): Promise<Outcome<Plant>> {
  const row = await findPlant(act.networkId, act.plantId, transaction);
  return row ? done(plantJson(row)) : NO_PLANT;
}

function noteAct(
  { networkId, plantId, userId }: PlantAct,
  { name }: PlantRow,
  action: string,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<void> {
  return appendAudit(
    { userId, networkId, action, subject: `plant ${name}`, detail: { plant: plantId, ...detail } },
    transaction,
  );
}
