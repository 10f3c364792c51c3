import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { insertNetwork, insertSettings, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { type NewNetwork } from '#lib/contracts/networks';
import { isDuplicateKey } from '../duplicateKey';

export type NetworkMaking =
  { outcome: 'made'; network: NetworkRow; settings: NetworkSettings } | { outcome: 'slug-taken' };

/** Makes a network; its first settings hold from the beginning, whatever the age of the data it will get. */
export async function makeNetwork(input: NewNetwork, userId: string): Promise<NetworkMaking> {
  const { slug, name } = input;
  const settings = settingsOf(input);
  try {
    return await inTransaction(async (transaction) => {
      const id = await insertNetwork({ slug, name }, transaction);
      await insertSettings(id, settings, userId, transaction);
      await appendAudit(
        {
          userId,
          networkId: id,
          action: 'network.make',
          subject: `network ${slug}`,
          detail: { after: { name, settings } },
        },
        transaction,
      );
      return { outcome: 'made', network: { id, slug, name }, settings };
    });
  } catch (error) {
    if (isDuplicateKey(error)) return { outcome: 'slug-taken' };
    throw error;
  }
}

function settingsOf(input: NewNetwork): NetworkSettings {
  const { day, evening, night } = input.periods;
  return {
    effectiveFromSec: 0,
    timeZone: input.timeZone,
    scheme: { dayStartMin: day, eveningStartMin: evening, nightStartMin: night },
    minimumCoverage: input.minimumCoverage,
    rules: { maximumWindSpeedMs: input.maximumWindSpeed, excludeRain: input.excludeRain },
  };
}
