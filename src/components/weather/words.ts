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
} as const;
