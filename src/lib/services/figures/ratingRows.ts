import { compareWithBackground, ratingLevel, type BackgroundVerdict } from '#lib/acoustics/ratingLevel';
import { type FigureRow } from '#lib/contracts/figureSheet';
import { type Statistics } from '#lib/contracts/levels';
import { formatLevelDb } from '#lib/format/levels';
import { type PeriodFigures } from '../levels/figures';
import { figureRow } from './figureRow';
import { type RatingEntry } from './ratingForm';
import { missingExceedance } from './samples';

const VERDICTS: Record<BackgroundVerdict, string> = {
  'low-impact': 'an indication of low impact',
  'less-likely': 'less likely to be adverse',
  adverse: 'likely to be adverse',
  'significantly-adverse': 'likely to be significantly adverse',
};

/** Rating level with the adjustments that a person entered, and how it lies to the background. */
export function ratingRows(figures: PeriodFigures, statistics: Statistics, entry: RatingEntry): FigureRow[] {
  const { LAeq } = statistics;
  const rating = LAeq === null ? null : ratingLevel(LAeq, entry.adjustments);
  const told = entry.adjustments
    .map(({ kind, adjustmentDb, reason }) => `${kind} +${adjustmentDb} dB (${reason})`)
    .join('; ');
  return [
    figureRow(
      {
        key: 'LAr',
        name: 'Rating level',
        value: rating?.ratingDb ?? null,
        convention:
          'LAeq plus the adjustments that a person enters with a reason, none by itself (BS 4142:2014+A1:2019; ISO 1996-1). ' +
          'The whole sound is taken as that of the source; residual sound is not taken out.',
        note: told === '' ? 'No adjustment was entered.' : `Adjustments: ${told}.`,
        ifMissing: 'No valid data in this period.',
      },
      figures,
    ),
    backgroundRow(figures, statistics, entry, rating?.ratingDb ?? null),
  ];
}

function backgroundRow(
  figures: PeriodFigures,
  { LAN }: Statistics,
  { backgroundDb }: RatingEntry,
  ratingDb: number | null,
): FigureRow {
  const ownDb = LAN['90'] ?? null;
  const levelDb = backgroundDb ?? ownDb;
  const comparison = ratingDb === null || levelDb === null ? null : compareWithBackground(ratingDb, levelDb);
  const of =
    backgroundDb === null
      ? 'LA90 of this very period, which holds the source too: give one without it'
      : 'as entered';
  return figureRow(
    {
      key: 'LAr-LA90',
      name: 'Rating level − background',
      value: comparison?.excessDb ?? null,
      isDifference: true,
      convention:
        'Against background LA90; about +5 dB adverse, about +10 dB significantly adverse (BS 4142 clause 11).',
      note: comparison
        ? `Background ${formatLevelDb(levelDb)} dB, ${of}. ${capital(VERDICTS[comparison.verdict])}, depending on the context.`
        : null,
      ifMissing:
        ratingDb === null
          ? 'No valid data in this period.'
          : `There is no LA90 of this period. ${missingExceedance(90, figures.levels.sums)}`,
    },
    figures,
  );
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
