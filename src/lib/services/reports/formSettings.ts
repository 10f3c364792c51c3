import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import type { NetworkRow } from '#db/queries/networks';
import { findReportForm, writeReportForm, type ReportForm } from '#db/queries/reports';
import type { ReportFormInput } from '#lib/contracts/reports';
import { stationChoices } from '../complaints/stationChoices';

/** The residents' form as its settings page shows it; one never set up is closed. */
export async function reportFormOf(network: NetworkRow): Promise<ReportForm> {
  return (await findReportForm(network.id)) ?? { isOpen: false, areas: [], keeper: network.name };
}

export type FormChange = { kind: 'changed' } | { kind: 'unknown-station'; station: string };

/** Opens, closes or changes the residents' form. */
export async function changeReportForm(
  userId: string,
  network: NetworkRow,
  form: ReportFormInput,
): Promise<FormChange> {
  const codes = new Set((await stationChoices(network.id)).map(({ code }) => code));
  const stray = form.areas.find(({ station }) => !codes.has(station));
  if (stray) return { kind: 'unknown-station', station: stray.station };
  await inTransaction(async (transaction) => {
    const before = await findReportForm(network.id, transaction);
    await writeReportForm(network.id, form, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId: network.id,
        action: 'report-form.change',
        subject: `network ${network.slug}`,
        detail: { before: before ?? null, after: form },
      },
      transaction,
    );
  });
  return { kind: 'changed' };
}
