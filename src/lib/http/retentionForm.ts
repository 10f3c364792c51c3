import { z } from 'zod';
import { LEAST_KEEP_MONTHS, MOST_KEEP_MONTHS } from '#lib/contracts/retention';
import { changeRetention } from '#lib/services/retention/settings';
import { typedNumber, type FormValues } from './forms';
import { invalidFields } from './problem';

const wrong = `must be a whole number of months from ${LEAST_KEEP_MONTHS} to ${MOST_KEEP_MONTHS}, or empty`;
const keepMonths = z
  .number(wrong)
  .int(wrong)
  .min(LEAST_KEEP_MONTHS, wrong)
  .max(MOST_KEEP_MONTHS, wrong)
  .nullable();

/**
 * Says for how many months single intervals are kept; an empty field: for good. That something will be deleted must be said to.
 * @throws {Problem} 422, and zod errors, with what is wrong by field.
 */
export async function changeRetentionFromForm(
  { text }: FormValues,
  who: { networkId: number; userId: string },
): Promise<void> {
  const given = text['keepMonths'] ?? '';
  const months = z
    .object({ keepMonths })
    .parse({ keepMonths: given === '' ? null : (typedNumber(given) ?? NaN) });
  if (months.keepMonths !== null && text['deletes'] !== 'yes') {
    throw invalidFields([
      { field: 'deletes', message: 'must be ticked, as what is deleted does not come back' },
    ]);
  }
  await changeRetention(who, months.keepMonths);
}
