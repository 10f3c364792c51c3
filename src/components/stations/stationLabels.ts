/** Labels of the station form's fields, by name. */
export const STATION_LABELS = {
  name: 'Name',
  code: 'Code',
  latitude: 'Latitude',
  longitude: 'Longitude',
  placement: 'Microphone',
  facadeCorrection: 'Façade correction',
  placementFrom: 'Holds from',
  mastHeight: 'Height',
  surroundings: 'Surroundings',
  bandFraction: 'Bands',
  firstBandHz: 'Lowest band',
  lastBandHz: 'Highest band',
  intervalSeconds: 'Interval',
  expectedFlags: 'Flags that are ordinary here',
  acceptsFrom: 'Refuse intervals before',
} as const;
