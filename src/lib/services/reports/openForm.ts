import { findNetworkBySlug, settingsAt, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { findReportForm, type ReportForm } from '#db/queries/reports';
import { areasInUse } from './areas';

/** A network as its residents meet it. */
export interface PublicNetwork {
  network: NetworkRow;
  settings: NetworkSettings;
  form: ReportForm;
}

/**
 * The network behind a public address. Undefined where there is none or where its form was never opened: nobody outside can
 * tell one from the other. A form that was closed again still leads residents to their private pages.
 */
export async function publicNetwork(slug: string, now: Date): Promise<PublicNetwork | undefined> {
  const network = await findNetworkBySlug(slug);
  const form = network && (await findReportForm(network.id));
  if (!network || !form) return undefined;
  const settings = await settingsAt(network.id, Math.floor(now.getTime() / 1000));
  return { network, settings, form: { ...form, areas: await areasInUse(network.id) } };
}
