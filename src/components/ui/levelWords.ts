import { formatCoverage, formatLevelDb } from '#lib/format/levels';

export interface LevelShown {
  levelDb: number | null;
  /** 0–1; left out for a single interval's level. */
  coverage?: number;
  meetsMinimum?: boolean;
  /** What the coverage is of, in words: "8 h". */
  of?: string;
}

export interface LevelWords {
  /** The figure, or the words in its place. */
  main: string;
  isFigure: boolean;
  /** Coverage in words, with the measured level where it is too little to stand as the period's. */
  note: string | null;
}

/** A period's level as it is shown: too little data gives words in the figure's place, never a figure that seems to stand. */
export function levelWords({ levelDb, coverage, meetsMinimum = true, of }: LevelShown): LevelWords {
  const note = coverage === undefined ? null : coverageWords(coverage, of);
  if (levelDb === null) return { main: coverage === 0 ? 'no data' : 'no figure', isFigure: false, note };
  if (meetsMinimum) return { main: formatLevelDb(levelDb), isFigure: true, note };
  return {
    main: 'not enough data',
    isFigure: false,
    note: `${note ?? ''}, measured ${formatLevelDb(levelDb)} dB`.replace(/^, /, ''),
  };
}

function coverageWords(coverage: number, of: string | undefined): string {
  return of ? `${formatCoverage(coverage)} of ${of}` : `${formatCoverage(coverage)} covered`;
}
