import {
  findAlertPreferences,
  setAlertPreferences,
  type AlertPreferences,
} from '#db/queries/alertPreferences';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listLimitVersions } from '#db/queries/limits';
import { listStations } from '#db/queries/stations';
import { toTenths } from '#lib/acoustics/rounding';
import type { AlertPreferencesInput } from '#lib/contracts/alerts';
import { byLimit } from '../limits/force';
import { done, invalid, type Outcome } from '../outcome';

interface Person {
  networkId: number;
  userId: string;
}

export interface OwnAlerts {
  preferences: AlertPreferences;
  /** Stations that may be chosen, by code. */
  stations: { id: number; code: string; name: string }[];
  /** Names of the limits in force that name the person's address. */
  namingLimits: string[];
}

/** How a person is told of a network's exceedances, and which limits name the person's address. */
export async function ownAlerts(person: Person, email: string): Promise<OwnAlerts> {
  const [preferences, stations, versions] = await Promise.all([
    findAlertPreferences(person.networkId, person.userId),
    listStations(person.networkId),
    listLimitVersions(person.networkId),
  ]);
  const latest = [...byLimit(versions).values()].flatMap((ofLimit) => ofLimit.slice(-1));
  const isNamed = (recipients: readonly string[]) =>
    recipients.some((recipient) => recipient.toLowerCase() === email.toLowerCase());
  return {
    preferences,
    stations: stations.map(({ id, code, name }) => ({ id, code, name })),
    namingLimits: latest
      .filter(({ recipients, withdrawnAt }) => withdrawnAt === null && isNamed(recipients))
      .map(({ name }) => name),
  };
}

/** Sets how a person is told. What waits already keeps the time that it was given. */
export async function changeOwnAlerts(person: Person, input: AlertPreferencesInput): Promise<Outcome<null>> {
  const stations = await listStations(person.networkId);
  const chosen = input.stations?.map((code) => stations.find((station) => station.code === code)?.id);
  if (chosen?.includes(undefined)) return invalid('stations', 'must be stations of this network');
  const after: AlertPreferences = {
    delivery: input.delivery,
    dailyAtMin: input.dailyAt % 1440,
    groupMin: input.groupMinutes,
    quietFromMin: input.quietFrom === null ? null : input.quietFrom % 1440,
    quietToMin: input.quietTo === null ? null : input.quietTo % 1440,
    overrideTenths: input.override === null ? null : toTenths(input.override),
    stationIds: chosen?.filter((id) => id !== undefined) ?? null,
    warnsEarly: input.warnsEarly,
  };
  await inTransaction(async (transaction) => {
    const before = await findAlertPreferences(person.networkId, person.userId, transaction);
    await setAlertPreferences(person, after, transaction);
    await appendAudit(
      {
        ...person,
        action: 'alert-preferences.change',
        subject: `person ${person.userId}`,
        detail: { before, after },
      },
      transaction,
    );
  });
  return done(null);
}
