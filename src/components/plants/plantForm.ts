import { WEEKDAYS } from '#lib/contracts/limits';
import type { PlantVersion } from '#lib/contracts/plants';

/** What stands in the fields of the form. */
export interface PlantValues {
  text: Readonly<Record<string, string>>;
  all(name: string): string[];
}

const NUMBERS = [
  'latitude',
  'longitude',
  'minRpm',
  'maxRpm',
  'blades',
  'poles',
  'cylinders',
  'mainsHz',
  'toneHz',
] as const;

/** What was typed into the form of a plant, as the interface's JSON has it; its schema judges the values. */
export function plantOfForm({ text, all }: PlantValues): Record<string, unknown> {
  return {
    ...Object.fromEntries(NUMBERS.map((name) => [name, numberOf(text[name])])),
    name: text['name'] ?? '',
    kind: text['kind'],
    strokes: numberOf(text['strokes']),
    weekdays: all('weekdays'),
    from: text['from'] || null,
    to: text['to'] || null,
    notes: text['notes'] ?? '',
    reason: text['reason'] ?? '',
  };
}

/** What the form shows of a plant that is to be changed: all but the reason. */
export function plantValues(plant: PlantVersion): PlantValues {
  const shown = (value: number | null) => (value === null ? '' : String(value));
  const isFixed = plant.minRpm === plant.maxRpm;
  return valuesOf(
    {
      ...Object.fromEntries(NUMBERS.map((name) => [name, shown(plant[name])])),
      ...(isFixed && { maxRpm: '' }),
      name: plant.name,
      kind: plant.kind,
      strokes: shown(plant.strokes),
      from: plant.from ?? '',
      // A time control has no 24:00.
      to: plant.to?.replace('24:00', '00:00') ?? '',
      notes: plant.notes,
    },
    plant.weekdays,
  );
}

/** What the form of a new plant shows at first. */
export const NEW_PLANT_VALUES = valuesOf({ kind: 'fan', mainsHz: '' }, WEEKDAYS);

function valuesOf(text: Record<string, string>, weekdays: readonly string[]): PlantValues {
  return { text, all: (name) => (name === 'weekdays' ? [...weekdays] : []) };
}

function numberOf(text: string | undefined): number | null {
  if (text === undefined || text === '') return null;
  return Number(text.replace(',', '.').replace('\u2212', '-'));
}
