import { csvText } from '#lib/format/csvText';
import { plantsOf } from './list';

const COLUMNS = [
  'name',
  'kind',
  'latitude',
  'longitude',
  'minRpm',
  'maxRpm',
  'blades',
  'poles',
  'cylinders',
  'strokes',
  'mainsHz',
  'toneHz',
  'weekdays',
  'from',
  'to',
  'notes',
  'version',
  'changedAt',
  'retiredAt',
] as const;

/** The plant register as a file, one line a plant, as it is noted now; retired ones too. */
export async function plantsCsv(networkId: number): Promise<string> {
  const rows = (await plantsOf(networkId)).map((plant) => {
    const cells = { ...plant, weekdays: plant.weekdays.join(' '), retiredAt: plant.retirement?.at ?? null };
    return COLUMNS.map((column) => cells[column]);
  });
  return csvText([[...COLUMNS], ...rows]);
}
