import type { PackItem } from '#lib/contracts/evidencePack';

/** Each item of the evidence in words, as it is ticked. */
export const ITEM_LABELS: Readonly<Record<PackItem, string>> = {
  stations: 'The nearest stations and how far each speaks for the place',
  levels: 'Levels, coverage and uncertainty',
  limits: 'Limits in force',
  usual: 'Against the usual for that weekday and hour',
  strip: 'The strip: bands and level over time',
  spectrum: 'The spectrum beside the usual one',
  tones: 'What stands out, tones, low frequencies',
  plants: 'Plant that could be the source (candidates, not findings)',
  exceedances: 'Exceedances',
  exclusions: 'Measurements left out, with the reason',
  weather: 'Wind and what the instrument flagged',
  reports: 'Other complaints near in place and time (counts alone)',
  elsewhere: 'When the same spectrum was heard otherwise',
};

/** What goes along unless the liaison drops it. Candidates and what concerns others are added by a person. */
export const USUAL_ITEMS: readonly PackItem[] = [
  'stations',
  'levels',
  'limits',
  'usual',
  'strip',
  'spectrum',
  'tones',
  'exceedances',
  'exclusions',
  'weather',
];
