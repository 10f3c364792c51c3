import { type NetworkRow } from '#db/queries/networks';
import { networkChangesSchema, type NetworkChanges } from '#lib/contracts/networks';
import { changeNetwork } from '#lib/services/networks/change';
import { PERIOD_PRESETS } from '#lib/services/networks/formValues';
import { typedInstant } from '#lib/services/stations/formValues';
import { typedNumber, type FormValues } from './forms';
import { invalidFields } from './problem';

/**
 * Gives a network the name and the settings that the form says. Settings that reach back must be said to: the form's
 * `recompute`.
 * @throws {Problem} 422, and zod errors, with what is wrong by field.
 */
export async function changeNetworkFromForm(
  values: FormValues,
  network: NetworkRow,
  { userId, zone, nowSec }: { userId: string; zone: string; nowSec: number },
): Promise<void> {
  const changes = networkChangesSchema.parse(changesOfForm(values, zone));
  if (isUnsaidReachBack(changes, values, nowSec)) {
    throw invalidFields([{ field: 'recompute', message: 'must be ticked, as the time above has passed' }]);
  }
  await changeNetwork(network, changes, userId);
}

function isUnsaidReachBack({ effectiveFrom }: NetworkChanges, { text }: FormValues, nowSec: number): boolean {
  return effectiveFrom !== undefined && effectiveFrom < nowSec && text['recompute'] !== 'yes';
}

/** What was typed, as the interface's JSON has it. An emptied field is no number; a preset stands for its hours. */
function changesOfForm({ text }: FormValues, zone: string) {
  const hours = PERIOD_PRESETS.find(({ key }) => key === text['preset']) ?? text;
  const percent = typedNumber(text['minimumCoverage']) ?? NaN;
  return {
    name: text['name'] ?? '',
    timeZone: text['timeZone'] ?? '',
    periods: { day: hours['day'] ?? '', evening: hours['evening'] || null, night: hours['night'] ?? '' },
    minimumCoverage: percent / 100,
    maximumWindSpeed: typedNumber(text['maximumWindSpeed']) ?? NaN,
    excludeRain: text['excludeRain'] === 'yes',
    effectiveFrom: typedInstant(text['effectiveFrom'] ?? '', zone) ?? undefined,
  };
}
