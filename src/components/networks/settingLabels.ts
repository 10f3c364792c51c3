/** Labels of the settings form's fields, by name. */
export const SETTING_LABELS = {
  name: 'Name',
  timeZone: 'Time zone',
  preset: 'Start from',
  periods: 'Day, evening and night',
  minimumCoverage: 'Minimum coverage',
  maximumWindSpeed: 'Most wind',
  excludeRain: 'Intervals flagged rain',
  effectiveFrom: 'From when',
  recompute: 'Recompute',
} as const;
