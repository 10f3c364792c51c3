import {
  findDueRecipient,
  lockDueItems,
  markItemsTold,
  type AlertItemRow,
  type DueRecipient,
} from '#db/queries/alertItems';
import { listAlertPeople, type AlertPerson } from '#db/queries/alertPreferences';
import { inTransaction, type Connection } from '#db/queries/connection';
import { insertExceedanceMails } from '#db/queries/exceedanceMails';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import { insertMail } from '#db/queries/outbox';
import { config } from '#lib/config/index';
import { acknowledgeUrl } from '#lib/services/alerts/acknowledgeLink';
import { eachAlone, restingSubjects } from '../jobs/alone';
import type { ChangeWords } from './describeChange';
import { exceedanceMail } from './exceedanceMail';
import { messageIdOf } from '#lib/services/mails/messageId';

const JOB = 'compose-alerts';

type StoredWords = ChangeWords & { isStanding: boolean };

/**
 * Puts what is due for one recipient into the outbox as one message: items and message are one transaction, so that nothing is
 * told twice or left out. Of several revisions of an exceedance the last one is told.
 */
export async function composeAlerts(
  network: NetworkRow,
  recipient: string,
  now: Date,
  transaction: Connection,
): Promise<void> {
  const items = await lockDueItems({ networkId: network.id, recipient }, now, transaction);
  if (items.length === 0) return;
  const latest = [...new Map(items.map((item) => [item.exceedanceId, item])).values()];
  const people = await listAlertPeople(network.id, transaction);
  const person = people.find(({ email }) => email.toLowerCase() === recipient.toLowerCase());
  const words = latest.map((item) => told(item, person, now));
  const messageId = messageIdOf(`exceedances:${recipient}:${items.map(({ key }) => key).join(',')}`);
  const base = `${config().origin}/n/${network.slug}`;
  const mailId = await insertMail(
    {
      ...exceedanceMail(words, {
        subject: {
          before: '',
          several: `${network.name}: ${words.length} windows above or no longer above a limit`,
        },
        opening: null,
        closing: [
          `You get this because your address is named in the limit: ${base}/limits`,
          ...(person ? [`What you are sent, and when, you choose here: ${base}/alerts`] : []),
        ],
        listUrl: `${base}/exceedances`,
      }),
      messageId,
      dedupeKey: `exceedances:${messageId}`,
      networkId: network.id,
      kind: 'exceedances',
      recipient,
    },
    transaction,
  );
  const exceedanceIds = latest.map(({ exceedanceId }) => exceedanceId);
  if (mailId !== null) await insertExceedanceMails(mailId, exceedanceIds, transaction);
  await markItemsTold(
    items.map(({ id }) => id),
    now,
    transaction,
  );
}

/**
 * Composes the message of the recipient who waits longest; one whose message cannot be composed rests. @returns 1, or 0 when nobody
 * waits.
 */
export async function composeDueAlerts(now: Date): Promise<number> {
  const waiting = await findDueRecipient(now, await restingSubjects(JOB, now));
  if (!waiting) return 0;
  return eachAlone(
    JOB,
    [waiting],
    ({ name, networkId }) => ({ name, networkId }),
    (one) => composeFor(one, now),
    now,
  );
}

function composeFor({ networkId, recipient }: DueRecipient, now: Date): Promise<number> {
  return inTransaction(
    async (transaction) => {
      const network = await findNetworkById(networkId, transaction);
      if (network) await composeAlerts(network, recipient, now, transaction);
      return 1;
    },
    { isolationLevel: 'read committed' },
  );
}

function told({ words, exceedanceId }: AlertItemRow, person: AlertPerson | undefined, now: Date) {
  const { isStanding, ...stored } = words as StoredWords;
  const nowSec = Math.floor(now.getTime() / 1000);
  const isOffered = person?.isOperator === true && isStanding;
  return {
    ...stored,
    acknowledgeUrl: isOffered ? acknowledgeUrl(exceedanceId, person.userId, nowSec) : null,
  };
}
