import { plantLines, rotationHz, type LineSource, type Machine, type PlantLine } from './plantTones';

/** Edges of what stands out of a spectrum, Hz; the upper one excluded. */
export interface SoughtRange {
  fromHz: number;
  toHz: number;
}

/** A machine's line that falls within a range that stands out. */
export interface LineMatch {
  line: PlantLine;
  /** Which of the ranges, by its place. */
  rangeAt: number;
  /** Part of the line's own frequencies that lies within the range, 0–1; 1 for a fixed speed. */
  fit: number;
}

/** Which lines of a machine explain what stands out: those of one source, lowest harmonic first. */
export interface PlantMatch {
  source: LineSource;
  matches: LineMatch[];
  /** How many of the ranges it explains. */
  rangeCount: number;
  /** The shaft itself, and the hum of a motor, are weaker than what the machine is made to do. */
  isSecondary: boolean;
  /** Best fit of its matches. */
  fit: number;
}

/**
 * The source of a machine that explains most of what stands out; null when none does. Harmonics of one source count together,
 * those of different sources do not: a machine of many lines would match anything.
 */
export function matchPlant(machine: Machine, ranges: readonly SoughtRange[]): PlantMatch | null {
  const bySource = new Map<LineSource, LineMatch[]>();
  for (const line of plantLines(machine)) {
    ranges.forEach((range, rangeAt) => {
      const fit = fitOf(line, range);
      if (fit === 0) return;
      bySource.set(line.source, [...(bySource.get(line.source) ?? []), { line, rangeAt, fit }]);
    });
  }
  const rotates = rotationHz(machine) !== null;
  const found = [...bySource].map(([source, matches]): PlantMatch => ({
    source,
    matches,
    rangeCount: new Set(matches.map(({ rangeAt }) => rangeAt)).size,
    isSecondary: source === 'shaft' || (source === 'mains' && rotates),
    fit: Math.max(...matches.map(({ fit }) => fit)),
  }));
  return found.sort(byStrength)[0] ?? null;
}

/** Orders matches, most convincing first: ranges explained, kind of source, fit, lowest harmonic. */
export function byStrength(a: PlantMatch, b: PlantMatch): number {
  const lowest = ({ matches }: PlantMatch) => Math.min(...matches.map(({ line }) => line.harmonic));
  return (
    b.rangeCount - a.rangeCount ||
    Number(a.isSecondary) - Number(b.isSecondary) ||
    b.fit - a.fit ||
    lowest(a) - lowest(b)
  );
}

function fitOf(line: PlantLine, range: SoughtRange): number {
  const widthHz = line.toHz - line.fromHz;
  if (widthHz === 0) return range.fromHz <= line.fromHz && line.fromHz < range.toHz ? 1 : 0;
  const sharedHz = Math.min(line.toHz, range.toHz) - Math.max(line.fromHz, range.fromHz);
  return Math.max(0, sharedHz / widthHz);
}
