import { findStationById } from '#db/queries/stations';
import type { EvidencePack } from '#lib/contracts/evidencePack';
import { windowStrip } from '../../strip/windowStrip';
import { gatherEvidence, type EvidenceQuery } from '../evidence';
import { otherReports } from './otherReports';
import { standingOf } from './representative';

/**
 * All that can go with the answer to a complaint. The same complaint has the same pack as long as the data and what people
 * decided are the same. When the same spectrum was heard otherwise is a search of its own and is added by who asks for it.
 */
export async function gatherPack(query: EvidenceQuery): Promise<EvidencePack> {
  const { complaint, nowSec } = query;
  const window = { fromSec: complaint.startsAtSec, toSec: complaint.endsAtSec };
  const station =
    complaint.nearestStationId === null ? undefined : await findStationById(complaint.nearestStationId);
  const [{ evidence, whereabouts }, strip, reports] = await Promise.all([
    gatherEvidence(query),
    station ? windowStrip(station, window, nowSec) : null,
    otherReports(complaint),
  ]);
  return {
    evidence,
    standings: evidence.stations.map((found) => standingOf(found, whereabouts[found.station] ?? null)),
    strip,
    reports,
    elsewhere: null,
  };
}
