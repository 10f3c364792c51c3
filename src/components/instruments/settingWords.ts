import type { CalibrationSettingsJson } from '#lib/contracts/calibrations';

/** Field → what its label says. */
export const SETTING_LABELS = {
  driftBound: 'Largest drift',
  checkEveryDays: 'Check every',
  remindBeforeDays: 'Remind',
  recipients: 'Who is reminded',
} as const;

/** What the form shows of the settings, by field. */
export function settingText(settings: CalibrationSettingsJson): Record<string, string> {
  return {
    driftBound: String(settings.driftBound),
    checkEveryDays: String(settings.checkEveryDays),
    remindBeforeDays: String(settings.remindBeforeDays),
    recipients: settings.recipients.join('\n'),
  };
}
