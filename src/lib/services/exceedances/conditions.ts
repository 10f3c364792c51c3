import { listExclusions } from '#db/queries/exclusions';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { sumConditions, type FlaggedConditions } from '#db/queries/windowConditions';
import { FLAG_NAMES, flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Conditions } from '#lib/contracts/exceedanceDetail';
import { LATE_AFTER_SEC } from '../levels/seen';
import type { Span } from '../levels/spans';

const MOST_EXCLUSIONS = 50;

/** Weather, flags, lateness and standing exclusions of a window; `settings` in force at its beginning. */
export async function windowConditions(
  station: StationRow,
  window: Span,
  settings: NetworkSettings,
): Promise<Conditions> {
  const { maximumWindSpeedMs } = settings.rules;
  const [groups, exclusions] = await Promise.all([
    sumConditions(station.id, window, { maximumWindSpeedMs, lateAfterSec: LATE_AFTER_SEC }),
    listExclusions({
      networkId: station.networkId,
      stationId: station.id,
      ...window,
      limit: MOST_EXCLUSIONS,
      after: null,
    }),
  ]);
  return {
    seconds: sum(groups, 'seconds'),
    wind: windOf(groups, maximumWindSpeedMs),
    temperature: temperatureOf(groups),
    flags: FLAG_NAMES.map((flag) => ({
      flag,
      seconds: sum(
        groups.filter(({ flags }) => flagNames(flags).includes(flag)),
        'seconds',
      ),
    })).filter(({ seconds }) => seconds > 0),
    secondsLate: sum(groups, 'lateSeconds'),
    exclusions: exclusions
      .filter(({ withdrawnAt }) => withdrawnAt === null)
      .map(({ fromSec, toSec, reason }) => ({
        from: formatInstantUtc(fromSec),
        to: formatInstantUtc(toSec),
        reason,
      })),
  };
}

function windOf(groups: readonly FlaggedConditions[], boundMs: number): Conditions['wind'] {
  const seconds = sum(groups, 'windSeconds');
  if (seconds === 0) return null;
  return {
    mean: sum(groups, 'windMetres') / seconds,
    maximum: Math.max(...groups.map(({ maximumWindMs }) => maximumWindMs ?? 0)),
    bound: boundMs,
    secondsAbove: sum(groups, 'windySeconds'),
  };
}

function temperatureOf(groups: readonly FlaggedConditions[]): Conditions['temperature'] {
  const lowest = groups.map(({ minimumTemperatureC }) => minimumTemperatureC).filter((c) => c !== null);
  const highest = groups.map(({ maximumTemperatureC }) => maximumTemperatureC).filter((c) => c !== null);
  return lowest.length === 0 ? null : { minimum: Math.min(...lowest), maximum: Math.max(...highest) };
}

function sum(
  groups: readonly FlaggedConditions[],
  field: 'seconds' | 'windSeconds' | 'windMetres' | 'windySeconds' | 'lateSeconds',
): number {
  return groups.reduce((total, group) => total + group[field], 0);
}
