import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { noiseCriterion, type NcEdition } from '#lib/acoustics/noiseCriterion';
import { LOW_FREQUENCY_BOUND_DB } from '#lib/acoustics/lowFrequency';
import { type FigureRow } from '#lib/contracts/figureSheet';
import { type Statistics } from '#lib/contracts/levels';
import { type PeriodFigures } from '../levels/figures';
import { type PeriodInstruments } from './instruments';
import { figureRow } from './figureRow';
import { ratingRows } from './ratingRows';
import { type RatingEntry } from './ratingForm';
import { type MeasuredHour } from './heatMap';
import { type SheetSource } from './source';
import { stationOctaves } from './stationBands';
import { uncertaintyRow } from './uncertaintyRow';

const NC_EDITIONS: readonly NcEdition[] = ['ANSI/ASA S12.2-2019', 'Beranek 1957'];
const ROOMS = 'Meant for rooms; outdoors it only describes the spectrum.';

/** Figures that judge the period's levels: low frequency, NR, NC, rating level, background, uncertainty. */
export function assessmentRows(
  source: SheetSource,
  figures: PeriodFigures,
  statistics: Statistics,
  hours: readonly MeasuredHour[],
  entry: RatingEntry,
  instruments: PeriodInstruments,
): FigureRow[] {
  return [
    lowFrequencyRow(figures, statistics),
    noiseRatingRow(figures, statistics),
    ...NC_EDITIONS.map((edition) => noiseCriterionRow(edition, source, figures)),
    ...ratingRows(figures, statistics, entry),
    uncertaintyRow(figures, hours, instruments),
  ];
}

function lowFrequencyRow(figures: PeriodFigures, { lowFrequency }: Statistics): FigureRow {
  const { cValidSec } = figures.levels.sums;
  return figureRow(
    {
      key: 'LCeq-LAeq',
      name: 'LCeq − LAeq',
      value: lowFrequency?.difference ?? null,
      isDifference: true,
      convention: `Low-frequency indicator of the same valid intervals; above ${LOW_FREQUENCY_BOUND_DB} dB low frequencies deserve a look (sources differ, 10–20 dB).`,
      note: lowFrequency
        ? `${lowFrequency.isAbove ? 'Above' : 'Not above'} the bound. A screening, not a finding.`
        : null,
      ifMissing:
        cValidSec === 0
          ? 'The monitor sent no LCeq.'
          : 'Only a part of the valid intervals has an LCeq, so the two are not of the same sound.',
    },
    figures,
  );
}

function noiseRatingRow(figures: PeriodFigures, { noiseRating }: Statistics): FigureRow {
  return figureRow(
    {
      key: 'NR',
      name: noiseRating?.isAtLeast ? 'NR, at least' : 'NR',
      value: noiseRating?.NR ?? null,
      unit: '',
      decimals: 0,
      convention:
        'Highest (L − a)/b over the octaves 31.5 Hz–8 kHz of the mean spectrum, rounded up (ISO/R 1996:1971).',
      note: noiseRating
        ? `The ${bandLabel({ nominalHz: noiseRating.governingHz })} octave governs.${noiseRating.isAtLeast ? ' An octave is missing.' : ''} ${ROOMS}`
        : null,
      ifMissing: 'No octave from 31.5 Hz to 8 kHz has a level.',
    },
    figures,
  );
}

function noiseCriterionRow(edition: NcEdition, source: SheetSource, figures: PeriodFigures): FigureRow {
  const octaves = stationOctaves(source.station, figures.levels);
  const levelsDb = octaves.map(({ index }) => figures.levels.octaveLeqDb(index));
  const rating = noiseCriterion(levelsDb, octaves, edition);
  const governing = rating ? bandLabel(bandAt(1, rating.governingIndex)) : '';
  const bound = { rated: '', 'below-curves': 'below NC 15', 'above-curves': 'above NC 70' };
  return figureRow(
    {
      key: edition === 'Beranek 1957' ? 'NC-1957' : 'NC',
      name: rating?.isAtLeast && rating.kind === 'rated' ? 'NC, at least' : 'NC',
      value: rating?.kind === 'rated' ? rating.nc : null,
      unit: '',
      decimals: 0,
      convention: `Tangent method, curves of ${edition}, interpolated.`,
      note:
        rating?.kind === 'rated'
          ? `The ${governing} octave governs.${rating.isAtLeast ? ' An octave is missing.' : ''} ${ROOMS}`
          : null,
      ifMissing: rating
        ? `The ${governing} octave lies ${bound[rating.kind]}, outside the curves.`
        : 'No octave of the curves has a level.',
    },
    figures,
  );
}
