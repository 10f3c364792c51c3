import { WEEKDAYS, type Weekday } from '#lib/contracts/limits';
import type { PlantKind, PlantVersion } from '#lib/contracts/plants';
import { scheduleWords } from '#lib/format/plants';

export const KIND_WORDS: Readonly<Record<PlantKind, string>> = {
  fan: 'Fan or blower',
  pump: 'Pump',
  compressor: 'Compressor',
  engine: 'Engine or generator',
  transformer: 'Transformer',
  alarm: 'Alarm or warning signal',
  other: 'Something else',
};

/** Field → what its label says, for the summary of errors. */
export const PLANT_LABELS = {
  name: 'Name',
  kind: 'What it is',
  latitude: 'Latitude',
  longitude: 'Longitude',
  minRpm: 'Speed of rotation, or the lowest',
  maxRpm: 'Highest speed',
  blades: 'Blades, vanes or lobes',
  poles: 'Poles of its motor',
  cylinders: 'Cylinders',
  strokes: 'Strokes',
  mainsHz: 'Mains frequency',
  toneHz: 'Tone of its own',
  weekdays: 'Runs on',
  from: 'Starts at',
  to: 'Stops at',
  notes: 'Notes',
  reason: 'Reason for the change',
  retired: 'Out of use',
} as const;

export const WEEKDAY_LABELS: Readonly<Record<Weekday, string>> = {
  mon: 'Mon',
  tue: 'Tue',
  wed: 'Wed',
  thu: 'Thu',
  fri: 'Fri',
  sat: 'Sat',
  sun: 'Sun',
};

/** When a plant runs: "Mon–Fri 21:00–06:00". */
export function scheduleOf({ weekdays, from, to }: Pick<PlantVersion, 'weekdays' | 'from' | 'to'>): string {
  const bits = weekdays.reduce((all, day) => all | (1 << WEEKDAYS.indexOf(day)), 0);
  return scheduleWords(bits, { from, to });
}

/** What of a plant tells the frequencies that it makes: "1480/min, 8 blades, 50 Hz"; "—" when nothing does. */
export function machineWords(plant: PlantVersion): string {
  const { minRpm, maxRpm, blades, poles, cylinders, strokes, mainsHz, toneHz } = plant;
  const speed = minRpm === maxRpm ? String(minRpm) : `${minRpm}–${maxRpm}`;
  const words = [
    minRpm !== null && `${speed}/min`,
    blades !== null && `${blades} blades`,
    poles !== null && `${poles} poles`,
    cylinders !== null && `${cylinders} cylinders, ${strokes === 2 ? 'two' : 'four'}-stroke`,
    mainsHz !== null && `mains ${mainsHz} Hz`,
    toneHz !== null && `tone ${toneHz} Hz`,
  ];
  return words.filter(Boolean).join(', ') || '—';
}
