import { type WeatherSettled } from '#lib/contracts/weatherQuarantine';

/** Labels of the fields of the weather pages' forms. */
export const WEATHER_LABELS = {
  code: 'Code',
  name: 'Name',
  latitude: 'Latitude',
  longitude: 'Longitude',
  height: 'Height of the anemometer',
  maximumAge: 'How far a record speaks',
  station: 'Station',
  from: 'From',
  to: 'Until',
  file: 'File',
  ids: 'Record',
  reason: 'Reason',
} as const;

/** What settling refused records of a mast came to. */
export function settledWeatherWords({ settled, passedOver, detail }: WeatherSettled): string {
  const records = (count: number) => `${count} ${count === 1 ? 'record' : 'records'}`;
  const rest =
    passedOver > 0 ? ` ${records(passedOver)} left as they are${detail === null ? '' : `: ${detail}`}` : '';
  return `${records(settled)} settled.${rest}`;
}
