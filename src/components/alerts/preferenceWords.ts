import { clockTimeText } from '#lib/format/clockTime';

export const PREFERENCE_LABELS: Readonly<Record<string, string>> = {
  delivery: 'When you are told',
  dailyAt: 'Time of the daily digest',
  groupMinutes: 'Least minutes between two messages',
  quietFrom: 'Quiet from',
  quietTo: 'Quiet until',
  override: 'At once all the same from',
  stations: 'Stations',
  warnsEarly: 'Early warnings',
};

interface Shown {
  delivery: string;
  dailyAtMin: number;
  groupMin: number;
  quietFromMin: number | null;
  quietToMin: number | null;
  overrideTenths: number | null;
  warnsEarly: boolean;
}

/** Preferences as the form's fields show them. */
export function preferenceText(preferences: Shown): Record<string, string> {
  const { quietFromMin, quietToMin, overrideTenths } = preferences;
  return {
    delivery: preferences.delivery,
    dailyAt: clockTimeText(preferences.dailyAtMin),
    groupMinutes: String(preferences.groupMin),
    quietFrom: quietFromMin === null ? '' : clockTimeText(quietFromMin),
    quietTo: quietToMin === null ? '' : clockTimeText(quietToMin),
    override: overrideTenths === null ? '' : (overrideTenths / 10).toFixed(1),
    warnsEarly: preferences.warnsEarly ? 'yes' : '',
  };
}
