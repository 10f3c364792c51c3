import { CHART, levelY, round, shareX, type ChartRange } from '#components/figures/chartScale.ts';
import type { TrendMonth } from '#lib/contracts/summaryDesk';
import type { SummaryMetric } from '#lib/contracts/summaryTemplate';

interface Point {
  x: number;
  y: number;
  /** Whether the coverage behind it is enough. */
  isMet: boolean;
}

/** A station’s line: pieces where months follow one another, and a place for its code that no other’s takes. */
export interface TrendLine {
  code: string;
  look: number;
  points: Point[];
  pieces: string[];
  label: { x: number; y: number } | null;
}

const LOOKS = 5;
const LABEL_GAP = 12;

/** Lines of all stations of some months. */
export function trendLines(
  months: readonly TrendMonth[],
  metric: SummaryMetric,
  range: ChartRange,
): TrendLine[] {
  const codes = [...new Set(months.flatMap(({ stations }) => stations.map(({ code }) => code)))].sort();
  const lines = codes.map((code, at) => lineOf(code, at % LOOKS, months, metric, range));
  return spread(lines);
}

function lineOf(
  code: string,
  look: number,
  months: readonly TrendMonth[],
  metric: SummaryMetric,
  range: ChartRange,
): TrendLine {
  const points = months.map(({ stations }, at): Point | null => {
    const station = stations.find((one) => one.code === code);
    const level = station?.[metric] ?? null;
    if (!station || level === null) return null;
    const share = months.length < 2 ? 0.5 : at / (months.length - 1);
    return { x: shareX(share), y: levelY(range, level), isMet: station.meetsMinimum };
  });
  const pieces: string[] = [];
  points.forEach((point, at) => {
    const before = points[at - 1];
    if (point && before) pieces.push(`M${before.x} ${before.y}L${point.x} ${point.y}`);
  });
  const found = points.filter((point) => point !== null);
  const last = found.at(-1);
  return { code, look, points: found, pieces, label: last ? { x: last.x + 7, y: last.y + 4 } : null };
}

/** Labels that would lie on one another move down. */
function spread(lines: readonly TrendLine[]): TrendLine[] {
  const labelled = [...lines].sort((a, b) => (a.label?.y ?? 0) - (b.label?.y ?? 0));
  let lowest = -Infinity;
  return labelled.map((line) => {
    if (!line.label) return line;
    const y = Math.min(CHART.top + CHART.height + 4, Math.max(line.label.y, lowest + LABEL_GAP));
    lowest = y;
    return { ...line, label: { x: line.label.x, y: round(y) } };
  });
}
