import { bandSetOf, type BandSet } from '#db/queries/bandSets';
import { type LockedQuarantined } from '#db/queries/quarantine';
import { type BandFraction } from '#lib/acoustics/bands';
import { readEnvelope } from '../receive/envelope';

/** Kept records that were sent with the same bands. */
export interface KeptGroup {
  bandSet: BandSet | { problem: string };
  records: LockedQuarantined[];
  /** The records as sent, in the same order. */
  intervals: unknown[];
}

interface KeptJson {
  bands: number[];
  interval: unknown;
}

/** Groups kept records by the bands that they were sent with, read as those of a station whose bands are of `fraction`. */
export async function readKept(
  records: readonly LockedQuarantined[],
  fraction: BandFraction,
): Promise<KeptGroup[]> {
  const groups = new Map<string, KeptGroup>();
  for (const record of records) {
    const { bands, interval } = JSON.parse(record.record) as KeptJson;
    const key = bands.join();
    const group = groups.get(key) ?? {
      bandSet: await bandSetFor(bands, fraction),
      records: [],
      intervals: [],
    };
    groups.set(key, group);
    group.records.push(record);
    group.intervals.push(interval);
  }
  return [...groups.values()];
}

async function bandSetFor(bands: number[], fraction: BandFraction): Promise<KeptGroup['bandSet']> {
  const { bandIndices } = readEnvelope(JSON.stringify({ bands, intervals: [null] }), fraction);
  return 'problem' in bandIndices ? bandIndices : bandSetOf(fraction, bandIndices.indices);
}
