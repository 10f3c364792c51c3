import { insertAlertItems, lastToldAt, type NewAlertItem } from '#db/queries/alertItems';
import { listAlertPeople, type AlertPerson } from '#db/queries/alertPreferences';
import type { Connection } from '#db/queries/connection';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import type { TellChanges, TellingChange } from '#ingest/detect/judge';
import { toTenths } from '#lib/acoustics/rounding';
import { TELL_WITHIN_HOURS } from '#lib/contracts/limits';
import { limitUnit } from '#lib/format/limitMetric';
import { alertDueSec } from '#lib/services/alerts/dueAt';
import { groupBy } from '#lib/services/groupBy';
import { composeAlerts } from './composeAlerts';
import { describeChange } from './describeChange';

/** A change to an exceedance that was mailed is told however long ago its window ended. */
const TELL_WITHIN_SEC = TELL_WITHIN_HOURS * 3600;

/**
 * Notes for each recipient what is to be told and when, as the person wishes; what is due now goes into the outbox as one message a
 * network and recipient. An address without an account that opens the network is told everything at once.
 */
export const tellExceedances: TellChanges = async (changes, now, transaction) => {
  const recent = changes.filter((change) => isWorthTelling(change, now));
  for (const [networkId, ofNetwork] of groupBy(recent, ({ station }) => station.networkId)) {
    const network = await findNetworkById(networkId, transaction);
    if (network) await tellNetwork(network, ofNetwork, now, transaction);
  }
};

async function tellNetwork(
  network: NetworkRow,
  changes: readonly TellingChange[],
  now: Date,
  transaction: Connection,
): Promise<void> {
  const recipients = [...new Set(changes.flatMap(({ verdict }) => verdict.version.recipients))];
  if (recipients.length === 0) return;
  const people = await listAlertPeople(network.id, transaction);
  const told = await lastToldAt(network.id, recipients, transaction);
  for (const recipient of recipients) {
    const person = people.find(({ email }) => email.toLowerCase() === recipient.toLowerCase());
    const lastToldSec = secOf(told.get(recipient) ?? null);
    const items = changes
      .filter(
        ({ verdict, station }) => verdict.version.recipients.includes(recipient) && wants(person, station.id),
      )
      .map((change) => itemOf(change, { network, recipient, person, lastToldSec, now }));
    await insertAlertItems(items, now, transaction);
    if (items.some(({ dueAt }) => dueAt <= now)) await composeAlerts(network, recipient, now, transaction);
  }
}

interface Addressed {
  network: NetworkRow;
  recipient: string;
  person: AlertPerson | undefined;
  lastToldSec: number | null;
  now: Date;
}

function itemOf(change: TellingChange, addressed: Addressed): NewAlertItem {
  const { network, recipient, person, lastToldSec, now } = addressed;
  const nowSec = now.getTime() / 1000;
  const moment = { nowSec, lastToldSec, excessTenths: excessTenthsOf(change) };
  const dueSec = person ? alertDueSec(person.preferences, moment, change.settings.timeZone) : nowSec;
  return {
    networkId: network.id,
    recipient,
    exceedanceId: change.exceedanceId,
    key: keyOf(change),
    words: { ...describeChange(change, network.slug), isStanding: change.kind !== 'lifted' },
    dueAt: new Date(dueSec * 1000),
  };
}

function wants(person: AlertPerson | undefined, stationId: number): boolean {
  const stationIds = person?.preferences.stationIds ?? null;
  return stationIds === null || stationIds.includes(stationId);
}

/** Tenths of a dB above the limit; null for what is no longer above, or is not told in dB. */
function excessTenthsOf({ kind, verdict }: TellingChange): number | null {
  if (kind === 'lifted' || verdict.levelDb === null || limitUnit(verdict.version.metric) !== 'dB')
    return null;
  return toTenths(verdict.levelDb) - verdict.version.thresholdTenths;
}

const secOf = (date: Date | null) => date && date.getTime() / 1000;

/** Whether a change is still news: its window ended within two days, or it was told then. */
export function isWorthTelling({ kind, verdict, detectedAt }: TellingChange, now: Date): boolean {
  const toldAtSec = (kind === 'found' ? now : detectedAt).getTime() / 1000;
  return toldAtSec - verdict.endSec <= TELL_WITHIN_SEC;
}

/** Names a revision of an exceedance, so that each is told once. */
export function keyOf({ exceedanceId, revision, detectedAt }: TellingChange): string {
  return `${exceedanceId}/${revision}/${detectedAt.getTime()}`;
}
