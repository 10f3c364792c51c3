import { clockTimeText } from '#lib/format/clockTime';
import type { OwnAlertsAnswer } from '#lib/contracts/alertRoutes';
import type { OwnAlerts } from './preferences';

/** How a person is told, as the interface gives it. */
export function ownAlertsJson({ preferences, stations, namingLimits }: OwnAlerts): OwnAlertsAnswer {
  const { dailyAtMin, quietFromMin, quietToMin, overrideTenths, stationIds } = preferences;
  const codeOf = new Map(stations.map(({ id, code }) => [id, code]));
  const clock = (minutes: number | null) => (minutes === null ? null : clockTimeText(minutes));
  return {
    preferences: {
      delivery: preferences.delivery,
      dailyAt: clockTimeText(dailyAtMin),
      groupMinutes: preferences.groupMin,
      quietFrom: clock(quietFromMin),
      quietTo: clock(quietToMin),
      override: overrideTenths === null ? null : overrideTenths / 10,
      stations: stationIds && stationIds.map((id) => codeOf.get(id) ?? String(id)),
      warnsEarly: preferences.warnsEarly,
    },
    namingLimits,
  };
}
