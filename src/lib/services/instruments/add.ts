import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findInstrument, insertInstrument } from '#db/queries/instruments';
import { type Instrument, type NewInstrument } from '#lib/contracts/instruments';
import { isDuplicateKey } from '../duplicateKey';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { instrumentJson } from './instrumentJson';

export const NO_INSTRUMENT = unknown('The network has no instrument with this number.');
export const SERIAL_TAKEN = invalid('serialNumber', 'belongs to another instrument of this network');

/** Adds an instrument, which stands nowhere yet. */
export async function addInstrument(
  networkId: number,
  input: NewInstrument,
  userId: string,
): Promise<Outcome<Instrument>> {
  try {
    return await inTransaction(async (transaction) => {
      const id = await insertInstrument(networkId, input, userId, transaction);
      const subject = `instrument ${input.serialNumber}`;
      const detail = { after: input };
      await appendAudit({ userId, networkId, action: 'instrument.add', subject, detail }, transaction);
      const row = await findInstrument(networkId, id, transaction);
      return row ? done(instrumentJson(row, [], 0)) : NO_INSTRUMENT;
    });
  } catch (error) {
    if (isDuplicateKey(error)) return SERIAL_TAKEN;
    throw error;
  }
}
