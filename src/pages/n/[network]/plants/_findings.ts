import { formatInstantUtc } from '#lib/contracts/common';
import { newPlantFindingSchema } from '#lib/contracts/plantCandidates';
import type { FormValues } from '#lib/http/forms';
import { valueOf } from '#lib/http/outcome';
import { badRequest } from '#lib/http/problem';
import { decideOnPlant } from '#lib/services/plants/decide';

interface Setting {
  station: Parameters<typeof decideOnPlant>[0] | null;
  period: { fromSec: number; toSec: number };
  userId: string;
  nowSec: number;
}

/**
 * Keeps what a person said about a plant as the source in the period of the page.
 * @throws {Problem} and zod errors, with what is wrong by field.
 */
export async function decideFromForm({ text }: FormValues, setting: Setting): Promise<void> {
  const { station, period, userId, nowSec } = setting;
  if (!station) throw badRequest('The page names no station. Nothing was kept.');
  const input = newPlantFindingSchema.parse({
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    plant: Number(text['plant'] ?? ''),
    verdict: text['verdict'],
    note: text['note'] ?? '',
  });
  valueOf(await decideOnPlant(station, input, { userId, nowSec }));
}
