import type { PeriodScheme } from '#lib/acoustics/dayEveningNight';

/** What the fields of a limit's rule are shown with. */
export interface RuleFieldsProps {
  /** What stands in the fields: texts by name, and every value of a name. */
  values: { text: Readonly<Record<string, string>>; all(name: string): string[] };
  errors: Readonly<Record<string, string>>;
  stations: readonly { code: string; name: string }[];
  groups: readonly { id: number; name: string }[];
  bands: readonly { value: string; label: string }[];
  /** How many named dates the network has. */
  holidayCount: number;
  settings: { timeZone: string; scheme: PeriodScheme; minimumCoverage: number };
}
