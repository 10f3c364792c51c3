import type { EvidenceExceedance, StationEvidence } from '#lib/contracts/complaintEvidence';
import { limitValueText } from '#lib/format/limitMetric';
import { instantSec } from './instants';
import { dataState } from './measured';
import { windowInWords } from './times';

const MOST_LISTED = 6;
const ON_RECORD = 'This is on record, and the monthly summary that the authority reads will list it.';

/** Which limits were passed at a station, or how far it may be said that none was. */
export function limitsParagraph(station: StationEvidence, zone: string): string {
  const standing = station.exceedances.filter((exceedance) => exceedance.state === 'standing');
  if (standing.length > 0) return passed(standing, zone);
  if (dataState(station) !== 'enough') return '';
  if (station.limits.set === 0) return 'No limit is set for this station, so there is none to compare with.';
  if (station.limits.applying === 0) return 'None of the limits set for this station applies at that time.';
  if (station.limits.unjudged > 0) {
    return 'Not every period for which a limit applies there has been judged yet; so far no exceedance is on record for that time.';
  }
  return (
    'No exceedance of the limits that apply at this station is on record for that time. A level within the limits does ' +
    'not mean that the sound could not be heard, or that it did not disturb you.'
  );
}

function passed(standing: EvidenceExceedance[], zone: string): string {
  const listed = standing.slice(0, MOST_LISTED).map((exceedance) => passedInWords(exceedance, zone));
  const [only] = listed;
  if (standing.length === 1) return `A limit was exceeded: ${only} ${ON_RECORD}`;
  const more = standing.length - listed.length;
  return [
    `Limits were exceeded ${standing.length} times in that time:`,
    ...listed.map((text) => `– ${text}`),
    ...(more > 0 ? [`– and ${more} more.`] : []),
    ON_RECORD,
  ].join('\n');
}

function passedInWords(
  { limit, metric, from, to, level, threshold, unit = 'dB' }: EvidenceExceedance,
  zone: string,
): string {
  const window = windowInWords(instantSec(from), instantSec(to), zone);
  return `“${limit}” (${metric}), ${window}: measured ${limitValueText(level, unit)}, limit ${limitValueText(threshold, unit)}.`;
}
