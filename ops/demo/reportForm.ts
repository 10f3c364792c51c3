import { changeReportForm } from '#lib/services/reports/formSettings';
import type { NetworkRow } from '#db/queries/networks';
import type { DemoStation } from './stations';

/** Opens the residents' form of the demo, with an area around each station. */
export async function seedReportForm(
  network: NetworkRow,
  liaisonId: string,
  stations: readonly DemoStation[],
): Promise<void> {
  const areas = stations.map(({ site }) => ({ name: areaAround(site), station: site.code }));
  const keeper = 'the community liaison of the Merrow estuary, liaison@merrow.example';
  await changeReportForm(liaisonId, network, { isOpen: true, keeper, areas });
}

/** Name of the area around a station. */
export function areaAround({ name }: DemoStation['site']): string {
  return `Around ${name}`;
}
