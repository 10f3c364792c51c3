import { bandSetOf, type BandSet } from '#db/queries/bandSets';
import { bandByNominalHz, type BandFraction } from '#lib/acoustics/bands';
import { IMPORT_FIELDS, type ImportField, type ImportMapping } from '#lib/contracts/imports';
import { LocalInstants, zoneNamed } from '#lib/time/localInstants';

/** How the rows of a file are read: places of fields and bands in a row, and how its times and numbers are written. */
export interface Layout {
  mapping: ImportMapping;
  places: Partial<Record<ImportField, number>>;
  /** Ascending. */
  bands: { nominalHz: number; place: number }[];
  bandSet: BandSet;
  instants: LocalInstants;
}

export type LayoutProblem = { field: keyof ImportMapping; message: string };

/** Makes the layout of a mapping for a station whose bands are of `fraction`, or says what does not fit. */
export async function layoutOf(
  mapping: ImportMapping,
  fraction: BandFraction,
): Promise<Layout | { problems: LayoutProblem[] }> {
  const problems: LayoutProblem[] = [];
  const zone = zoneNamed(mapping.zone);
  if (!zone) {
    problems.push({
      field: 'zone',
      message: 'must be a zone such as Europe/London, or UTC, UTC+1, UTC+05:30',
    });
  }
  const places: Layout['places'] = {};
  const bands: { nominalHz: number; place: number; index: number }[] = [];
  mapping.columns.forEach((target, place) => {
    if (target === null) return;
    const field = IMPORT_FIELDS.find((known) => known === target);
    if (field) {
      places[field] = place;
      return;
    }
    const band = bandByNominalHz(fraction, Number(target));
    if (band) bands.push({ nominalHz: band.nominalHz, place, index: band.index });
    else problems.push({ field: 'columns', message: notABand(target, fraction) });
  });
  if (!zone || problems.length > 0) return { problems: problems.slice(0, 3) };
  bands.sort((a, b) => a.index - b.index);
  const bandSet = await bandSetOf(
    fraction,
    bands.map(({ index }) => index),
  );
  return { mapping, places, bands, bandSet, instants: new LocalInstants(zone) };
}

function notABand(target: string, fraction: BandFraction): string {
  const kind = fraction === 3 ? 'one-third-octave' : 'octave';
  return `has ${target} Hz, which is no nominal ${kind} frequency; this station has ${kind} bands`;
}
