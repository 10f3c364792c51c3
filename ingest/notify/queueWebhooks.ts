import type { TellChanges } from '#ingest/detect/judge';
import { groupBy } from '#lib/services/groupBy';
import { queueEvents } from '#lib/services/webhooks/queueEvents';
import { isWorthTelling, keyOf } from './tellExceedances';

/** Notes for each webhook of a network what is to be posted, in the transaction of the changes. */
export const queueWebhooks: TellChanges = async (changes, now, transaction) => {
  const recent = changes.filter((change) => isWorthTelling(change, now));
  for (const [networkId, ofNetwork] of groupBy(recent, ({ station }) => station.networkId)) {
    const events = ofNetwork.map((change) => ({
      exceedanceId: change.exceedanceId,
      kind: change.kind,
      key: keyOf(change),
    }));
    await queueEvents(networkId, events, now, transaction);
  }
};
