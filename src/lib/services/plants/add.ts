import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findPlant, insertPlant } from '#db/queries/plants';
import { type NewPlant, type Plant } from '#lib/contracts/plants';
import { isDuplicateKey } from '../duplicateKey';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { plantDetails, plantJson } from './plantJson';

export const NO_PLANT = unknown('The network has no plant with this number.');
export const NAME_TAKEN = invalid('name', 'belongs to another plant of this network');

/** Adds a plant to the register, in use. */
export async function addPlant(networkId: number, input: NewPlant, userId: string): Promise<Outcome<Plant>> {
  try {
    return await inTransaction(async (transaction) => {
      const note = { reason: '', createdBy: userId };
      const id = await insertPlant(networkId, plantDetails(input), note, transaction);
      const row = await findPlant(networkId, id, transaction);
      const subject = `plant ${input.name}`;
      await appendAudit(
        { userId, networkId, action: 'plant.add', subject, detail: { plant: id, after: input } },
        transaction,
      );
      return row ? done(plantJson(row)) : NO_PLANT;
    });
  } catch (error) {
    if (isDuplicateKey(error)) return NAME_TAKEN;
    throw error;
  }
}
