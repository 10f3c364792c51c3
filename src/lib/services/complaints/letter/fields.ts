import { nearestOf, type LetterFacts } from './facts';
import * as figures from './figures';
import { representativeParagraph } from './representative';
import { secondStationParagraph } from './secondStation';
import * as statements from './statements';
import { REPORTED } from './words';

/** A field of a letter: a name that stands for what the data say. */
export interface LetterField {
  name: string;
  label: string;
  /** `statement`: whole sentences that say no more than the data; `figure`: a figure within a sentence; `fact`: who and what. */
  kind: 'statement' | 'figure' | 'fact';
  render: (facts: LetterFacts) => string;
}

const statement = (name: string, label: string, render: LetterField['render']): LetterField => ({
  name,
  label,
  kind: 'statement',
  render,
});
const figure = (name: string, label: string, render: LetterField['render']): LetterField => ({
  name,
  label,
  kind: 'figure',
  render,
});
const fact = (name: string, label: string, render: LetterField['render']): LetterField => ({
  name,
  label,
  kind: 'fact',
  render,
});

/** Every field that a letter or a template may have. */
export const LETTER_FIELDS: readonly LetterField[] = [
  fact('name', 'Name of the resident', ({ recipientName }) => recipientName ?? 'resident'),
  fact('reference', 'Reference of the complaint', ({ reference }) => reference),
  fact('sound', 'What was reported: “the hum”', ({ kind }) => REPORTED[kind]),
  fact('time', 'The time of the complaint, with its date', statements.windowText),
  fact('network', 'Name of the network', ({ networkName }) => networkName),
  fact('signed-by', 'Name of who answers', ({ signedBy }) => signedBy),
  statement('opening', 'Thanks, and what was reported', statements.opening),
  statement('clock-change', 'That the clocks changed around that time, if they did', statements.clockChange),
  statement('measured', 'What the nearest station measured, or that it did not', statements.measured),
  statement(
    'representative',
    'How far that station speaks for the place, where it does not fully',
    representativeParagraph,
  ),
  statement('compared', 'Compared with the same weekday and hours of the weeks before', statements.compared),
  statement('limits', 'Limits passed, or how far it may be said that none was', statements.limits),
  statement('tones', 'Whether a tone stood out', statements.tones),
  statement('second-station', 'That a second station tells otherwise, if one does', secondStationParagraph),
  statement('elsewhere', 'Another station, where the nearest one lacks data', statements.elsewhere),
  statement('other-reports', 'How many others complained around then; counts alone', statements.otherReports),
  statement('caution', 'That levels describe the station’s place, and who decides', statements.caution),
  statement('again', 'What to do if it happens again', statements.again),
  fact('station', 'Name of the nearest station', figures.stationFigure),
  figure('distance', 'Its distance', figures.distanceFigure),
  figure('direction', 'Where it lies, seen from the resident', figures.directionFigure),
  figure(
    'laeq',
    'Average level, LAeq',
    figures.levelFigure(({ LAeq }) => LAeq),
  ),
  figure(
    'lafmax',
    'Loudest moment, LAFmax',
    figures.levelFigure(({ LAFmax }) => LAFmax),
  ),
  figure(
    'la10',
    'Level reached a tenth of the time, LA10',
    figures.levelFigure(({ LA10 }) => LA10),
  ),
  figure(
    'la90',
    'Level reached nine tenths of the time, LA90',
    figures.levelFigure(({ LA90 }) => LA90),
  ),
  figure('coverage', 'Part of the time that was measured', figures.coverageFigure),
  figure('uncertainty', 'Expanded uncertainty of LAeq', figures.uncertaintyFigure),
  figure('usual-middle', 'Middle of the usual levels', figures.usualMiddleFigure),
  figure('usual-range', 'Range of the usual levels', figures.usualRangeFigure),
  figure('difference', 'Difference from that middle', figures.differenceFigure),
  figure('rank', 'Percentile rank among the weeks before, in words', figures.rankFigure),
];

const BY_NAME = new Map(LETTER_FIELDS.map((field) => [field.name, field]));

export function fieldByName(name: string): LetterField | undefined {
  return BY_NAME.get(name);
}

/** What a letter with figures must say for them not to claim more than the data. */
export function neededStatements(facts: LetterFacts): string[] {
  const nearest = nearestOf(facts);
  const isLimitPassed = nearest?.exceedances.some(({ state }) => state === 'standing') ?? false;
  return [
    'measured',
    ...(representativeParagraph(facts) === '' ? [] : ['representative']),
    ...(isLimitPassed ? ['limits'] : []),
    ...(secondStationParagraph(facts) === '' ? [] : ['second-station']),
    ...(statements.clockChange(facts) === '' ? [] : ['clock-change']),
  ];
}
