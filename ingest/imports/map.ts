import { findImport } from '#db/queries/imports';
import { findStationById } from '#db/queries/stations';
import { type ImportMapping } from '#lib/contracts/imports';
import { mapImport, type ActOutcome } from '#lib/services/imports/act';
import { layoutOf, type LayoutProblem } from './layout';

/** Says what the columns of an import's file are, once they fit its station, and has it checked. */
export async function mapColumns(
  asked: { networkId: number; id: number; userId: string },
  mapping: ImportMapping,
): Promise<ActOutcome | { kind: 'invalid'; problems: LayoutProblem[] }> {
  const row = await findImport(asked.networkId, asked.id);
  const station = row && (await findStationById(row.stationId));
  if (!station) return { kind: 'unknown' };
  const layout = await layoutOf(mapping, station.bandFraction);
  if ('problems' in layout) return { kind: 'invalid', problems: layout.problems };
  return mapImport({ ...asked, mapping });
}
