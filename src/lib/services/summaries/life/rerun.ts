import { pool } from '#db/queries/connection';
import { insertDirtyMarks } from '#db/queries/dirtyMarks';
import { listIssuedFiles, type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { listSettings, type NetworkRow } from '#db/queries/networks';
import { findSeal } from '#db/queries/retention';
import { listStations } from '#db/queries/stations';
import { type DataDigest, type SummaryManifest } from '#lib/contracts/summaryManifest';
import { quartersTouching } from '#lib/time/quarters';
import { readKeptFile } from '../../files/keptFile';
import { changedFigures, type BareChange } from './changedFigures';
import { monthSpan } from '../monthSpan';
import { dataSpan, digestMonth } from '../seal/dataDigest';
import { sealedMonth } from './differences';
import { measureIn, type MeasuredMonth } from './measure';

/** What came of computing an issued month again. */
export interface Rerun {
  /** Sealed files that are gone or have other bytes, by name. */
  damagedFiles: string[];
  /** Stations whose intervals are not those that were sealed. */
  changedData: string[];
  /** Earlier months of the year whose sums are not those that were sealed, by station; null: nothing was sealed of them. */
  changedYear: { station: string; month: string }[] | null;
  /** Stations whose intervals are not kept any more: their figures are compared with the stored sums’. */
  withoutIntervals: string[];
  /** Figures of those stations that only intervals tell, and that differ or are missing for that. */
  notCompared: number;
  differences: BareChange[];
}

/** Parts of a station’s month that only intervals tell. */
const OF_INTERVALS = /^(exclusions (figures|leftOut)|tonality|lowFrequency|wind|figures LAFmaxAt)/;
/** Levels by the clock: where the month’s midnights part a night, its hours are counted from intervals. */
const BY_THE_CLOCK =
  /^(bands|octaves|spectrogram|(figures|yearToDate) (?!(U )?L(day|evening|night|den)\b|periods))/;

class Undo extends Error {}

/**
 * Computes an issued month again from its intervals, past every stored sum, and compares it with the sealed figures. Where the intervals
 * of a station are not kept any more, from its stored sums. Nothing is changed.
 * @throws {SealBroken} where manifest, signature or sealed figures do not hold.
 */
export async function rerunMonth(network: NetworkRow, issued: IssuedSummaryRow): Promise<Rerun> {
  const { manifest, doc } = await sealedMonth(issued);
  const { measured: fromIntervals, withoutIntervals } = await measureFromIntervals(network, issued, manifest);
  const all = changedFigures(doc, fromIntervals.doc);
  const differences = all.filter(
    ({ station, figure }) =>
      station === null ||
      !withoutIntervals.includes(station) ||
      !(OF_INTERVALS.test(figure) || BY_THE_CLOCK.test(figure)),
  );
  return {
    damagedFiles: await damaged(issued, manifest),
    changedData: changed(manifest.data, fromIntervals.data).filter(
      (code) => !withoutIntervals.includes(code),
    ),
    changedYear: changedYear(manifest.data, fromIntervals.data),
    withoutIntervals,
    notCompared: all.length - differences.length,
    differences,
  };
}

/** Marks every quarter-hour of the month as to be recomputed, in a transaction that is given up: so nothing stored is believed. */
async function measureFromIntervals(
  network: NetworkRow,
  issued: IssuedSummaryRow,
  { data }: SummaryManifest,
): Promise<{ measured: MeasuredMonth; withoutIntervals: string[] }> {
  let found: { measured: MeasuredMonth; withoutIntervals: string[] } | undefined;
  const asOf = issued.issuedAt;
  const run = pool().transaction(
    async (transaction) => {
      const span = monthSpan(issued.month, await listSettings(network.id, transaction));
      const stations = await listStations(network.id, transaction);
      const { fromSec, toSec } = dataSpan(span);
      const missing = gone(data, await digestMonth(stations, span, transaction));
      for (const { id, code } of stations) {
        // Partly gone counts as gone: what is left tells nothing of the whole.
        if ((await findSeal(id, transaction)).keptFromSec > fromSec && isSealed(data, code))
          missing.push(code);
        if (missing.includes(code)) continue;
        await insertDirtyMarks(id, quartersTouching(fromSec, toSec), transaction);
      }
      const measured = await measureIn(transaction, network, issued.month, asOf);
      found = { measured, withoutIntervals: [...new Set(missing)] };
      throw new Undo();
    },
    { isolationLevel: 'repeatable read' },
  );
  await run.catch((error: unknown) => {
    if (!(error instanceof Undo)) throw error;
  });
  if (!found) throw new Error('The month was not computed.');
  return found;
}

const countOf = ({ stations }: DataDigest, code: string) =>
  stations.find((station) => station.code === code)?.intervals ?? 0;

const isSealed = (data: DataDigest, code: string) => countOf(data, code) > 0;

function gone(sealed: DataDigest, now: DataDigest): string[] {
  return sealed.stations
    .filter(({ code, intervals }) => intervals > 0 && countOf(now, code) === 0)
    .map(({ code }) => code);
}

function changed(sealed: DataDigest, now: DataDigest): string[] {
  const digestOf = ({ stations }: DataDigest, code: string) =>
    stations.find((station) => station.code === code && station.intervals > 0)?.sha256;
  const codes = new Set([...sealed.stations, ...now.stations].map(({ code }) => code));
  return [...codes].filter((code) => digestOf(sealed, code) !== digestOf(now, code)).sort();
}

function changedYear(sealed: DataDigest, now: DataDigest): Rerun['changedYear'] {
  if (!sealed.year) return null;
  const digests = ({ year }: DataDigest) =>
    new Map(
      (year?.stations ?? []).flatMap(({ code, months }) =>
        months.map(({ month, sha256 }) => [`${code} ${month}`, { station: code, month, sha256 }]),
      ),
    );
  const [before, after] = [digests(sealed), digests(now)];
  return [...new Map([...after, ...before])]
    .filter(([key]) => before.get(key)?.sha256 !== after.get(key)?.sha256)
    .map(([, { station, month }]) => ({ station, month }))
    .sort((a, b) => (`${a.station} ${a.month}` < `${b.station} ${b.month}` ? -1 : 1));
}

async function damaged(issued: IssuedSummaryRow, { files }: SummaryManifest): Promise<string[]> {
  const stored = await listIssuedFiles([issued.id]);
  const found: string[] = [];
  for (const file of files) {
    const row = stored.find(({ format }) => format === file.format);
    const isNamed = row?.sha256.toString('hex') === file.sha256 && row.byteCount === file.bytes;
    const bytes = await readKeptFile('summaries', Buffer.from(file.sha256, 'hex'));
    if (!isNamed || bytes?.length !== file.bytes) found.push(file.name);
  }
  return found;
}
