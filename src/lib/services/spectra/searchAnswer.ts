import { type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import {
  type SpectrumSearchAnswer,
  type SpectrumSearchOptions,
  type SpectrumSpell,
} from '#lib/contracts/spectrumSearch';
import { type Span } from '../levels/spans';
import { patternWords } from './patternWords';
import { type SearchResult } from './searchTask';
import { type Spell } from './spells';

/** What a search that cannot be made comes to. */
export const EMPTY_RESULT: SearchResult = {
  spells: [],
  spellsFound: 0,
  stations: [],
  pattern: {
    hours: new Array<number>(24).fill(0),
    weekdays: new Array<number>(7).fill(0),
    stretch: null,
    days: 'any',
  },
  isComplete: true,
  tookMs: 0,
};

interface Asked {
  stations: readonly StationRow[];
  /** Station that the spectrum is from. */
  askedId: number;
  order: SpectrumSearchOptions['order'];
  nowSec: number;
  searched: Span;
}

type Answered = Pick<
  SpectrumSearchAnswer,
  'isComplete' | 'tookSeconds' | 'stations' | 'spellsFound' | 'spells' | 'pattern'
>;

/** What a search found, with the stations' names and in words. */
export function searchAnswer(result: SearchResult, asked: Asked): Answered {
  const stationOf = new Map(asked.stations.map((station) => [station.id, station]));
  const named = (id: number) => ({
    station: stationOf.get(id)?.code ?? '',
    stationName: stationOf.get(id)?.name ?? '',
  });
  const minutes = Math.floor((Math.min(asked.searched.toSec, asked.nowSec) - asked.searched.fromSec) / 60);
  const elsewhere = result.stations
    .filter((one) => one.alikeMinutes > 0 && one.stationId !== asked.askedId)
    .sort((a, b) => b.alikeMinutes - a.alikeMinutes);
  const { hours, weekdays } = result.pattern;
  return {
    isComplete: result.isComplete,
    tookSeconds: Math.round(result.tookMs) / 1000,
    stations: result.stations.map(({ stationId, ...searched }) => ({
      ...named(stationId),
      ...searched,
      coverage: minutes > 0 ? Math.min(1, searched.minutes / minutes) : 0,
    })),
    spellsFound: result.spellsFound,
    spells: ordered(result.spells, asked.order).map((spell) => spellJson(spell, named(spell.stationId))),
    pattern: {
      hours,
      weekdays,
      words: patternWords(
        result.pattern,
        result.spellsFound,
        elsewhere.map(({ stationId }) => named(stationId).stationName),
      ),
    },
  };
}

function ordered(spells: readonly Spell[], order: SpectrumSearchOptions['order']): readonly Spell[] {
  return order === 'likeness' ? spells : [...spells].sort((a, b) => b.fromSec - a.fromSec);
}

function spellJson(spell: Spell, station: { station: string; stationName: string }): SpectrumSpell {
  return {
    ...station,
    from: formatInstantUtc(spell.fromSec),
    to: formatInstantUtc(spell.toSec),
    minutes: spell.minutes,
    best: spell.bestRmsDb,
    mean: spell.meanRmsDb,
    LAeq: spell.laeqDb,
  };
}
