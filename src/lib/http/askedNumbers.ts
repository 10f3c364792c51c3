import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import type { ComplaintNumbers, MeasureComparison } from '#lib/contracts/complaintNumbers';
import { compareMeasure } from '#lib/services/complaints/compareMeasure';
import { complaintNumbers } from '#lib/services/complaints/counts';
import { numbersSpan, readNumbersView, type NumbersView } from './complaintNumbers';

export interface AskedNumbers {
  view: NumbersView;
  numbers: ComplaintNumbers;
  /** Null where no measure is named, or none of it has passed. */
  measure: MeasureComparison | null;
}

/** The numbers that an address asks for. */
export async function askedNumbers(
  url: URL,
  { id }: NetworkRow,
  { timeZone }: NetworkSettings,
  nowSec: number,
): Promise<AskedNumbers> {
  const view = readNumbersView(url, timeZone, nowSec);
  const what = { networkId: id, timeZone, kind: view.kind, area: view.area };
  const numbers = await complaintNumbers({ ...what, ...numbersSpan(view, timeZone) }, nowSec);
  const measure = view.measure === null ? null : await compareMeasure(what, view.measure, view.days, nowSec);
  return { view, numbers, measure };
}
