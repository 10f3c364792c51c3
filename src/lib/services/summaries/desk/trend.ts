import { listIssuedFigures } from '#db/queries/issuedSummaries';
import { listDrafts } from '#db/queries/summaryDrafts';
import { type StationFigures } from '#lib/contracts/summaryLife';
import { type TrendMonth } from '#lib/contracts/summaryDesk';
import { SUMMARY_METRICS } from '#lib/contracts/summaryTemplate';
import { csvText } from '#lib/format/csvText';
import { roundHalfUp } from '#lib/acoustics/rounding';

/** Levels of a network’s months by station, earliest first: issued ones, and drafts of months of which nothing is issued. */
export async function summaryTrend(networkId: number): Promise<TrendMonth[]> {
  const [issued, drafts] = await Promise.all([listIssuedFigures(networkId), listDrafts(networkId)]);
  const months = new Map<string, TrendMonth>();
  for (const { month, revision, figures } of issued) {
    if (!months.has(month)) months.set(month, { month, revision, stations: figures });
  }
  for (const { month, figures } of drafts) {
    if (figures && !months.has(month)) months.set(month, { month, revision: null, stations: figures });
  }
  return [...months.values()].sort((a, b) => (a.month < b.month ? -1 : 1));
}

/** A month and station a line; levels to 0.0001 dB. */
export function trendCsv(months: readonly TrendMonth[]): string {
  const header = ['month', 'revision', 'station', 'name', 'coverage', 'meetsMinimum', ...SUMMARY_METRICS];
  const rows = months.flatMap(({ month, revision, stations }) =>
    stations.map((station) => [
      month,
      revision ?? 'draft',
      station.code,
      station.name,
      roundHalfUp(station.coverage, 6),
      String(station.meetsMinimum),
      ...SUMMARY_METRICS.map((metric) => levelCell(station, metric)),
    ]),
  );
  return csvText([header, ...rows]);
}

function levelCell(station: StationFigures, metric: (typeof SUMMARY_METRICS)[number]): number | null {
  const level = station[metric];
  return level === null ? null : roundHalfUp(level, 4);
}
