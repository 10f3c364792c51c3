import { type FigureRow } from '#lib/contracts/figureSheet';

/** What a row has of its own; the rest is the same for most. */
export type RowWords = Pick<FigureRow, 'key' | 'name' | 'value' | 'convention'> &
  Partial<Pick<FigureRow, 'unit' | 'decimals' | 'isDifference' | 'note'>> & { ifMissing: string };

/** A row of a table of figures; `ifMissing` says why there is no value, where there is none. */
export function figureRow(
  { ifMissing, ...words }: RowWords,
  { coverage, meetsMinimum }: Pick<FigureRow, 'coverage' | 'meetsMinimum'>,
): FigureRow {
  return {
    unit: 'dB',
    decimals: 1,
    isDifference: false,
    note: null,
    ...words,
    coverage,
    meetsMinimum,
    missing: words.value === null ? ifMissing : null,
  };
}
