import { z } from 'zod';
import type { Connection } from '#db/queries/connection';
import { listSealedAdditions } from '#db/queries/reports';
import { openValue } from '../complaints/personalData';

/** What a resident wrote on the private page after the report. */
export interface Addition {
  atSec: number;
  text: string;
}

/** Additions of a complaint, oldest first; none once the personal data have been erased. */
export async function listAdditions(complaintId: number, conn: Connection): Promise<Addition[]> {
  const sealed = await listSealedAdditions(complaintId, conn);
  return sealed.map(({ createdAt, wrappedKey, ciphertext }) => ({
    atSec: Math.floor(createdAt.getTime() / 1000),
    text: z.string().parse(openValue(wrappedKey, complaintId, 'addition', ciphertext)),
  }));
}
