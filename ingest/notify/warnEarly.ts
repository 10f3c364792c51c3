import { listAlertPeople, listWarnedNetworks, type AlertPerson } from '#db/queries/alertPreferences';
import { claimTelling, findTold } from '#db/queries/alertTellings';
import { inTransaction } from '#db/queries/connection';
import { findNetworkById, settingsAt, type NetworkRow } from '#db/queries/networks';
import { listStations, type StationRow } from '#db/queries/stations';
import { putNotes } from '#ingest/health/mail';
import type { LimitHeadroom } from '#lib/contracts/headroom';
import { isQuiet } from '#lib/services/alerts/dueAt';
import { isWorthWarning } from '#lib/services/alerts/earlyWarning';
import { stationHeadroom } from '#lib/services/headroom/headroom';
import { eachAlone, networkSubject } from '../jobs/alone';
import { warningNote } from './warningNote';

const JOB = 'warn-early';

/**
 * Writes to those who wish it, and are not in quiet hours, of windows that are open and heading above their limit: once a window,
 * station and person.
 * @returns how many messages were written.
 */
export async function warnEarly(now: Date): Promise<number> {
  const warnNetwork = (networkId: number) => warnOfNetwork(networkId, now);
  const subjectOf = (id: number) => networkSubject({ id });
  return eachAlone(JOB, await listWarnedNetworks(), subjectOf, warnNetwork, now);
}

async function warnOfNetwork(networkId: number, now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const network = await findNetworkById(networkId);
  if (!network) return 0;
  const { timeZone } = await settingsAt(networkId, nowSec);
  const people = (await listAlertPeople(networkId)).filter(
    ({ preferences }) => preferences.warnsEarly && !isQuiet(preferences, nowSec, timeZone),
  );
  if (people.length === 0) return 0;
  const warnOf = async (station: StationRow) => {
    const concerned = people.filter(({ preferences }) => concerns(preferences.stationIds, station));
    if (station.retiredAt !== null || concerned.length === 0) return 0;
    const { items } = await stationHeadroom(station, nowSec);
    const found = { network, station, timeZone, people: concerned };
    let written = 0;
    for (const item of items.filter(isWorthWarning)) written += await warn(item, found, now);
    return written;
  };
  const subjectOf = ({ id }: StationRow) => ({ name: `station ${id}`, networkId });
  return eachAlone(JOB, await listStations(networkId), subjectOf, warnOf, now);
}

const concerns = (stationIds: number[] | null, { id }: StationRow) => stationIds?.includes(id) ?? true;

interface Concerned {
  network: NetworkRow;
  station: StationRow;
  timeZone: string;
  people: readonly AlertPerson[];
}

async function warn(
  item: LimitHeadroom,
  { network, station, timeZone, people }: Concerned,
  now: Date,
): Promise<number> {
  const windowKey = `${item.limit.id}/${station.id}/${item.from}`;
  const subjectOf = ({ userId }: AlertPerson) => `${windowKey}/${userId}`;
  const told = await findTold('early-warning', people.map(subjectOf));
  const due = people.filter((person) => !told.has(subjectOf(person)));
  if (due.length === 0) return 0;
  return inTransaction(
    async (transaction) => {
      const recipients: string[] = [];
      for (const person of due) {
        const isOurs = await claimTelling('early-warning', subjectOf(person), now, transaction);
        if (isOurs) recipients.push(person.email);
      }
      const note = warningNote(item, { network, station, timeZone });
      const cause = { networkId: network.id, kind: 'early-warning', key: windowKey };
      return putNotes(note, cause, recipients, transaction);
    },
    { isolationLevel: 'read committed' },
  );
}
