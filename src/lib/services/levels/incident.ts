import { pool, type Connection } from '#db/queries/connection';
import { listPlacements, type PlacementRow } from '#db/queries/stationPlacements';
import { type StationRow } from '#db/queries/stations';
import { incidentLevel } from '#lib/acoustics/facade';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Incident, type PlacementSpan } from '#lib/contracts/levels';
import { periodFigures, type FiguresQuery } from './figures';
import { type Span } from './spans';

export interface IncidentQuery extends FiguresQuery {
  station: StationRow;
}

/**
 * LAeq of the incident sound of a period, with the correction of each stretch in which the microphone stood in one way. `measuredDb`
 * is the period's LAeq as measured, which stays what it is.
 */
export async function incidentOf(
  query: IncidentQuery,
  measuredDb: number | null,
  conn: Connection = pool(),
): Promise<Incident> {
  const spans = spansOf(await listPlacements(query.station, conn), query);
  const [only] = spans;
  const levelDb =
    spans.length === 1 && only
      ? incidentLevel(measuredDb, only.placement, only.facadeCorrectionDb).levelDb
      : await pooledDb(query, spans, conn);
  return { LAeq: levelDb, placements: spans.map(placementSpan) };
}

/** How the microphone stood in a period, stretch by stretch. */
export async function placementsIn(
  station: StationRow,
  period: Span,
  conn: Connection = pool(),
): Promise<PlacementSpan[]> {
  return spansOf(await listPlacements(station, conn), period).map(placementSpan);
}

type DatedSpan = Span & PlacementRow;

/** The first placement holds before it began, too: data may be older than the station's entry. */
function spansOf(placements: readonly PlacementRow[], { fromSec, toSec }: Span): DatedSpan[] {
  return placements
    .map((row, at) => ({
      ...row,
      fromSec: at === 0 ? fromSec : Math.max(fromSec, row.effectiveFromSec),
      toSec: Math.min(toSec, placements[at + 1]?.effectiveFromSec ?? toSec),
    }))
    .filter((span) => span.fromSec < span.toSec);
}

function placementSpan({ fromSec, toSec, placement, facadeCorrectionDb }: DatedSpan): PlacementSpan {
  return {
    from: formatInstantUtc(fromSec),
    to: formatInstantUtc(toSec),
    placement,
    correction: incidentLevel(null, placement, facadeCorrectionDb).correctionDb,
  };
}

/** Energy mean over the valid time of the stretches, each less its own correction. */
async function pooledDb(
  query: IncidentQuery,
  spans: readonly DatedSpan[],
  conn: Connection,
): Promise<number | null> {
  let energySec = 0;
  let validSec = 0;
  for (const { fromSec, toSec, placement, facadeCorrectionDb } of spans) {
    const { levels } = await periodFigures({ ...query, fromSec, toSec }, {}, conn);
    const { levelDb } = incidentLevel(levels.laeqDb(), placement, facadeCorrectionDb);
    if (levelDb === null) continue;
    energySec += 10 ** (levelDb / 10) * levels.sums.validSec;
    validSec += levels.sums.validSec;
  }
  return validSec === 0 ? null : 10 * Math.log10(energySec / validSec);
}
