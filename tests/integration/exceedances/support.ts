import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertExceedanceMails } from '#db/queries/exceedanceMails';
import { insertExceedance, updateExceedance } from '#db/queries/judgedExceedances';
import { insertLimit } from '#db/queries/limits';
import { insertMail } from '#db/queries/outbox';

/** Who is told of the limits that `makeLimit` makes. */
export const RECIPIENT = 'duty@quay.example';

interface LimitIds {
  limitId: number;
  versionId: number;
}

/** Adds a limit of LAeq,1 h at 55 dB to a network. */
export async function makeLimit(network: number, name: string): Promise<LimitIds> {
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

/** Adds an exceedance of an hour, found when its window had closed, as the judge does. */
export function makeExceedance(made: {
  networkId: number;
  stationId: number;
  limit: LimitIds;
  startSec: number;
  levelDb: number;
}): Promise<number> {
  const { networkId, stationId, limit, startSec, levelDb } = made;
  return inTransaction((transaction) =>
    insertExceedance(
      {
        networkId,
        stationId,
        limitId: limit.limitId,
        limitVersionId: limit.versionId,
        startSec,
        endSec: startSec + 3600,
        loudest: null,
        levelDb,
        thresholdTenths: 550,
        coverage: 0.98,
      },
      new Date((startSec + 3700) * 1000),
      transaction,
    ),
  );
}

/** Lifts an exceedance as the judge does when later data take it below the limit. */
export async function lift(id: number, found: { levelDb: number; coverage: number }): Promise<void> {
  const { limitVersionId, startSec, endSec } = await db()('exceedances')
    .where({ id })
    .first({ limitVersionId: 'limit_version_id', startSec: 'starts_at', endSec: 'ends_at' });
  await inTransaction((transaction) =>
    updateExceedance(
      id,
      {
        ...found,
        limitVersionId,
        startSec,
        endSec,
        loudest: null,
        thresholdTenths: 550,
        state: 'lifted',
        revision: 1,
      },
      new Date(),
      transaction,
    ),
  );
}

/** Puts a message about an exceedance into the outbox. */
export async function mailAbout(networkId: number, exceedanceId: number): Promise<void> {
  const mail = {
    messageId: `<${exceedanceId}@merrow.example>`,
    dedupeKey: String(exceedanceId),
    networkId,
    kind: 'exceedances',
    recipient: RECIPIENT,
    subject: 'Above the limit',
    text: '',
    html: '',
  };
  await inTransaction(async (transaction) => {
    const mailId = await insertMail(mail, transaction);
    await insertExceedanceMails(mailId ?? 0, [exceedanceId], transaction);
  });
}
