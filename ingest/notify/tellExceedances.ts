import type { Connection } from '#db/queries/connection';
import { insertExceedanceMails } from '#db/queries/exceedanceMails';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import { insertMail } from '#db/queries/outbox';
import type { TellChanges, TellingChange } from '#ingest/detect/judge';
import { config } from '#lib/config/index';
import { TELL_WITHIN_HOURS } from '#lib/contracts/limits';
import { groupBy } from '#lib/services/groupBy';
import { describeChange } from './describeChange';
import { exceedanceMail } from './exceedanceMail';
import { messageIdOf } from './messageId';

/** A change to an exceedance that was mailed is told however long ago its window ended. */
const TELL_WITHIN_SEC = TELL_WITHIN_HOURS * 3600;

/** Puts e-mails about changed exceedances into the outbox: one a network and recipient for the whole run. */
export const tellExceedances: TellChanges = async (changes, now, transaction) => {
  const recent = changes.filter((change) => isWorthTelling(change, now));
  for (const [networkId, ofNetwork] of groupBy(recent, ({ station }) => station.networkId)) {
    const network = await findNetworkById(networkId, transaction);
    if (!network) continue;
    const recipients = new Set(ofNetwork.flatMap(({ verdict }) => verdict.version.recipients));
    for (const recipient of recipients) {
      const concerning = ofNetwork.filter(({ verdict }) => verdict.version.recipients.includes(recipient));
      await putMail(network, recipient, concerning, transaction);
    }
  }
};

async function putMail(
  network: NetworkRow,
  recipient: string,
  changes: readonly TellingChange[],
  transaction: Connection,
): Promise<void> {
  const words = changes.map((change) => describeChange(change, network.slug));
  const limitsUrl = `${config().origin}/n/${network.slug}/limits`;
  const messageId = messageIdOf(`exceedances:${recipient}:${changes.map(keyOf).join(',')}`);
  const mailId = await insertMail(
    {
      ...exceedanceMail(network.name, words, limitsUrl),
      messageId,
      dedupeKey: `exceedances:${messageId}`,
      networkId: network.id,
      kind: 'exceedances',
      recipient,
    },
    transaction,
  );
  if (mailId !== null) {
    await insertExceedanceMails(
      mailId,
      changes.map(({ exceedanceId }) => exceedanceId),
      transaction,
    );
  }
}

function isWorthTelling({ kind, verdict, detectedAt }: TellingChange, now: Date): boolean {
  const toldAtSec = (kind === 'found' ? now : detectedAt).getTime() / 1000;
  return toldAtSec - verdict.endSec <= TELL_WITHIN_SEC;
}

/** Names a revision of an exceedance, so that each is told once. */
function keyOf({ exceedanceId, revision, detectedAt }: TellingChange): string {
  return `${exceedanceId}/${revision}/${detectedAt.getTime()}`;
}
