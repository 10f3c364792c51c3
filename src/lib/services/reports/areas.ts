import { findReportForm } from '#db/queries/reports';
import type { ReportArea } from '#lib/contracts/reports';
import { stationChoices } from '../complaints/stationChoices';

/** Areas that a complaint may name: those set up; without any, the surroundings of each station by its name. */
export async function areasInUse(networkId: number): Promise<ReportArea[]> {
  const form = await findReportForm(networkId);
  if (form && form.areas.length > 0) return form.areas;
  const stations = await stationChoices(networkId);
  return stations.map(({ code, name }) => ({ name, station: code }));
}
