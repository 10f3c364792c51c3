import { appendAudit } from '#db/queries/audit';
import { readDeskSettings, writeDeskSettings } from '#db/queries/complaintSettings';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import type { DeskSettings } from '#lib/contracts/complaintDesk';

/** How a network's desk works. */
export function deskSettingsOf(network: NetworkRow): Promise<DeskSettings> {
  return readDeskSettings(network.id);
}

/** Changes how the desk works. Due dates that were given stay; a place is told by the new step at once, of older complaints too. */
export async function changeDeskSettings(
  userId: string,
  network: NetworkRow,
  settings: DeskSettings,
): Promise<void> {
  await inTransaction(async (transaction) => {
    const before = await readDeskSettings(network.id, transaction);
    await writeDeskSettings(network.id, settings, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'complaint-settings.change',
        subject: `network ${network.slug}`,
        detail: { before, after: settings },
      },
      transaction,
    );
  });
}
