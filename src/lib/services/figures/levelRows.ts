import { levelFromBandsDb } from '#lib/acoustics/weighting';
import { type FigureRow } from '#lib/contracts/figureSheet';
import { EXCEEDANCE_PERCENTS, type Incident, type Statistics } from '#lib/contracts/levels';
import { bandLabel } from '#lib/acoustics/bands';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage } from '#lib/format/levels';
import { type PeriodFigures } from '../levels/figures';
import { facadeRows } from './facadeRows';
import { figureRow, type RowWords } from './figureRow';
import { missingExceedance, samplesNeeded } from './samples';
import { coveredOf, type SheetSource } from './source';
import { stationBands } from './stationBands';

/** How levels exceeded N % of the time are made, told once for all of them. */
export const EXCEEDANCE_CONVENTION =
  'LA1 to LA99: the smallest 0.1 dB class of the base samples, rounded half up, that is exceeded for no more than N % of the valid ' +
  'time, by duration and without interpolation (the inverted distribution). A level needs at least 300/min(N, 100 − N) samples, ' +
  'Bittern’s own rule.';

/** The levels of the period, A, C and Z. */
export function levelRows(
  source: SheetSource,
  figures: PeriodFigures,
  statistics: Statistics,
  incident: Incident,
): FigureRow[] {
  const { sums } = figures.levels;
  const none = sums.validSec === 0;
  const empty = 'No valid data in this period.';
  const row = (words: RowWords) =>
    figureRow({ ...words, ifMissing: none ? empty : words.ifMissing }, figures);
  const validWords = formatDuration(sums.validSec);
  return [
    row({
      key: 'LAeq',
      name: 'LAeq',
      value: statistics.LAeq,
      convention: 'Energy mean of the valid intervals by duration; missing time is not silence (ISO 1996-1).',
      ifMissing: empty,
    }),
    ...facadeRows(incident, figures, source.timeZone),
    lceqRow(source, figures, statistics),
    zeqRow(source, figures),
    row({
      key: 'LAFmax',
      name: 'LAFmax',
      value: statistics.LAFmax,
      convention: 'Highest of the valid intervals’ own, time weighting F.',
      ifMissing: 'The monitor sent no LAFmax.',
    }),
    row({
      key: 'LAFmin',
      name: 'LAFmin',
      value: statistics.LAFmin,
      convention: 'Lowest of the valid intervals’ own, time weighting F.',
      ifMissing: 'The monitor sent no LAFmin.',
    }),
    row({
      key: 'LCpeak',
      name: 'LCpeak',
      value: statistics.LCpeak,
      convention: 'Highest of the valid intervals’ own.',
      ifMissing: 'The monitor sent no LCpeak.',
    }),
    row({
      key: 'LAE',
      name: 'LAE',
      value: statistics.LAE,
      convention: `Exposure of the ${validWords} of valid data, re 1 s: LAeq + 10 lg(T/1 s) (ISO 1996-1).`,
      note: figures.coverage < 1 ? 'Of the valid time alone; time without data adds nothing.' : null,
      ifMissing: empty,
    }),
    ...EXCEEDANCE_PERCENTS.map((percent) => exceedanceRow(percent, figures, statistics)),
  ];
}

function exceedanceRow(percent: number, figures: PeriodFigures, statistics: Statistics): FigureRow {
  const of = statistics.sampleSeconds === null ? 'the base samples' : `LAeq,${statistics.sampleSeconds} s`;
  return figureRow(
    {
      key: `LA${percent}`,
      name: `LA${percent}`,
      value: statistics.LAN[String(percent)] ?? null,
      convention: `Exceeded ${percent} % of the valid time, of ${of}; from ${samplesNeeded(percent)} samples on.`,
      ifMissing: missingExceedance(percent, figures.levels.sums),
    },
    figures,
  );
}

function lceqRow(source: SheetSource, figures: PeriodFigures, { LCeq }: Statistics): FigureRow {
  const { cValidSec, validSec } = figures.levels.sums;
  const isPart = cValidSec > 0 && cValidSec < validSec;
  return figureRow(
    {
      key: 'LCeq',
      name: 'LCeq',
      value: LCeq,
      convention: 'Energy mean of the valid intervals that have an LCeq.',
      note: isPart ? `Only ${formatCoverage(cValidSec / validSec)} of the valid time has one.` : null,
      ifMissing: validSec === 0 ? 'No valid data in this period.' : 'The monitor sent no LCeq.',
    },
    coveredOf(source, source.period, cValidSec),
  );
}

/** Energy sum of the station's bands: of their range, never of all frequencies. */
function zeqRow(source: SheetSource, { levels }: PeriodFigures): FigureRow {
  const bands = stationBands(source.station, levels);
  const [first, last] = [bands.at(0), bands.at(-1)];
  const range = first && last ? `${bandLabel(first)}–${bandLabel(last)}` : '';
  const levelsDb = bands.map(({ index }) => levels.bandLeqDb(index));
  const isWhole = bands.length > 0 && levelsDb.every((level) => level !== null);
  const validSec = Math.min(...bands.map(({ slot }) => levels.sums.bandValidSec[slot] ?? 0));
  return figureRow(
    {
      key: 'LZeq',
      name: range ? `LZeq of the bands ${range}` : 'LZeq',
      value: isWhole ? levelFromBandsDb(levelsDb, bands, 'Z') : null,
      convention: 'Energy sum of the unweighted band levels; sound outside these bands is not in it.',
      ifMissing: levels.sums.isBandFractionMixed
        ? 'Octaves and thirds are mixed in this period.'
        : 'One of the bands has no level, so that their sum would be too low.',
    },
    coveredOf(source, source.period, Number.isFinite(validSec) ? validSec : 0),
  );
}
