import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertLimit } from '#db/queries/limits';

/** Who is told of the limits that `makeLimit` makes. */
export const RECIPIENT = 'duty@quay.example';

/** Adds a limit of LAeq,1 h at 55 dB to a network. */
export async function makeLimit(
  network: number,
  name: string,
): Promise<{ limitId: number; versionId: number }> {
  const id = await inTransaction((transaction) =>
    insertLimit(
      network,
      {
        effectiveFromSec: 0,
        name,
        metric: 'LAeq',
        averaging: '1h',
        bandFraction: null,
        bandIndex: null,
        thresholdTenths: 550,
        weekdays: 127,
        fromMin: null,
        toMin: null,
        minimumCoverage: null,
        stationIds: null,
        recipients: [RECIPIENT],
        reason: '',
        createdBy: null,
      },
      transaction,
    ),
  );
  const version = await db()('limit_versions').where({ limit_id: id }).first('id');
  return { limitId: id, versionId: version.id };
}
