import type { TellChanges, TellingChange } from '#ingest/detect/judge';
import { findNetworkById } from '#db/queries/networks';
import { insertMail } from '#db/queries/outbox';
import { config } from '#lib/config/index';
import { describeChange } from './describeChange';
import { exceedanceMail } from './exceedanceMail';
import { messageIdOf } from './messageId';

/**
 * Windows that ended longer ago make exceedances but no e-mail: a backfill or a limit tried on last year must not send hundreds.
 * A change to an exceedance that was mailed is always told.
 */
export const TELL_WITHIN_SEC = 48 * 3600;

/** Puts e-mails about changed exceedances into the outbox: one a network and recipient for the whole run. */
export const tellExceedances: TellChanges = async (changes, now, transaction) => {
  const recent = changes.filter((change) => isWorthTelling(change, now));
  for (const [networkId, ofNetwork] of groupBy(recent, ({ station }) => station.networkId)) {
    const network = await findNetworkById(networkId, transaction);
    if (!network) continue;
    const recipients = new Set(ofNetwork.flatMap(({ verdict }) => verdict.version.recipients));
    for (const recipient of recipients) {
      const concerning = ofNetwork.filter(({ verdict }) => verdict.version.recipients.includes(recipient));
      const words = concerning.map((change) => describeChange(change, network.slug));
      const limitsUrl = `${config().origin}/n/${network.slug}/limits`;
      const dedupeKey = `exceedances:${recipient}:${concerning.map(keyOf).join(',')}`;
      const messageId = messageIdOf(dedupeKey);
      await insertMail(
        {
          ...exceedanceMail(network.name, words, limitsUrl),
          messageId,
          dedupeKey: `exceedances:${messageId}`,
          networkId,
          kind: 'exceedances',
          recipient,
        },
        transaction,
      );
    }
  }
};

function isWorthTelling({ kind, verdict, detectedAt }: TellingChange, now: Date): boolean {
  const toldAtSec = (kind === 'found' ? now : detectedAt).getTime() / 1000;
  return toldAtSec - verdict.endSec <= TELL_WITHIN_SEC;
}

/** Names a change and its level, so that each revision is told once. */
function keyOf({ kind, exceedanceId, verdict }: TellingChange): string {
  return `${exceedanceId}/${kind}/${verdict.levelDb?.toFixed(2) ?? '-'}/${verdict.coverage.toFixed(4)}`;
}

function groupBy<T, K>(items: readonly T[], key: (item: T) => K): Map<K, T[]> {
  const groups = new Map<K, T[]>();
  for (const item of items) groups.set(key(item), [...(groups.get(key(item)) ?? []), item]);
  return groups;
}
