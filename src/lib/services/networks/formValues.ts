import { listSettings, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { NATIONAL_SCHEMES, type SourceStatus } from '#lib/acoustics/nationalSchemes';
import { formatClockTime } from '#lib/contracts/common';

/** Beginnings of the periods of day as a form or the interface writes them; an empty evening: none. */
export interface PeriodTexts {
  day: string;
  evening: string;
  night: string;
}

/** Hours in use somewhere, for a form to start from. */
export interface PeriodPreset extends PeriodTexts {
  key: string;
  label: string;
  source: string;
  status: SourceStatus;
}

/** National presets of day, evening and night. */
export const PERIOD_PRESETS: readonly PeriodPreset[] = NATIONAL_SCHEMES.map(
  ({ key, label, scheme, source, status }) => ({ key, label, source, status, ...periodTexts(scheme) }),
);

/** Beginnings of a scheme's periods: `07:00`. */
export function periodTexts({ dayStartMin, eveningStartMin, nightStartMin }: PeriodScheme): PeriodTexts {
  return {
    day: formatClockTime(dayStartMin),
    evening: eveningStartMin === null ? '' : formatClockTime(eveningStartMin),
    night: formatClockTime(nightStartMin),
  };
}

/** What the settings form shows of a network, by field. */
export function settingsFormText(
  network: Pick<NetworkRow, 'name'>,
  settings: NetworkSettings,
): Record<string, string> {
  return {
    name: network.name,
    timeZone: settings.timeZone,
    preset: '',
    ...periodTexts(settings.scheme),
    minimumCoverage: String(Number((settings.minimumCoverage * 100).toFixed(6))),
    maximumWindSpeed: String(settings.rules.maximumWindSpeedMs),
    excludeRain: settings.rules.excludeRain ? 'yes' : 'no',
    effectiveFrom: '',
  };
}

/** A network's settings in order of their beginning: what held, what holds, what will hold. */
export function settingsTimeline(networkId: number): Promise<NetworkSettings[]> {
  return listSettings(networkId);
}

/** Zones of the IANA database that this server knows. */
export const TIME_ZONES: readonly string[] = Intl.supportedValuesOf('timeZone');
