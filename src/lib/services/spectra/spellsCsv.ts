import { type SpectrumSearchAnswer, type SpectrumSpell } from '#lib/contracts/spectrumSearch';
import { csvText, type Cell } from '#lib/format/csvText';

const COLUMNS: [heading: string, cell: (spell: SpectrumSpell, answer: SpectrumSearchAnswer) => Cell][] = [
  ['station', ({ station }) => station],
  ['stationName', ({ stationName }) => stationName],
  ['from', ({ from }) => from],
  ['to', ({ to }) => to],
  ['alikeMinutes', ({ minutes }) => minutes],
  ['bestRmsDb', ({ best }) => best.toFixed(2)],
  ['meanRmsDb', ({ mean }) => mean.toFixed(2)],
  ['LAeq', ({ LAeq }) => LAeq.toFixed(2)],
  ['searchedCoverage', ({ station }, { stations }) => coverageOf(station, stations)],
  ['askedStation', (_, { asked }) => asked.station],
  ['askedFrom', (_, { asked }) => asked.from],
  ['askedTo', (_, { asked }) => asked.to],
  ['since', (_, { since }) => since],
  ['until', (_, { until }) => until],
];

/** The spells of a search as CSV, each with what was looked for, where, and the coverage of its station there. */
export function spellsCsv(answer: SpectrumSearchAnswer): string {
  return csvText([
    COLUMNS.map(([heading]) => heading),
    ...answer.spells.map((spell) => COLUMNS.map(([, cell]) => cell(spell, answer))),
  ]);
}

function coverageOf(code: string, stations: SpectrumSearchAnswer['stations']): string {
  return (stations.find(({ station }) => station === code)?.coverage ?? 0).toFixed(4);
}
