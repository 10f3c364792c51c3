import { type ShapeQuery } from '#lib/acoustics/shapeSearch';
import { type Pattern } from './pattern';
import { type Spell } from './spells';

/** What a search needs to know; passes between threads. */
export interface SearchTask {
  networkId: number;
  stations: { id: number; intervalSec: number }[];
  /** Minutes that begin in `fromSec <= t < toSec` are looked at. */
  fromSec: number;
  toSec: number;
  /** Where the spectrum is from: not found again. */
  asked: { stationId: number; fromSec: number; toSec: number };
  /** Minutes that are looked at nowhere; null: none. */
  leftOut: { fromSec: number; toSec: number } | null;
  query: ShapeQuery;
  gapMinutes: number;
  timeZone: string;
  /** The search stops then and says how far it came. */
  mostMs: number;
}

/** What was looked at of one station. */
export interface SearchedStation {
  stationId: number;
  /** Days of UTC with data that were searched, and those that were left out because they wait for recomputation. */
  days: number;
  daysLeftOut: number;
  /** Minutes with a spectrum among those asked for. */
  minutes: number;
  /** Alike ones of them. */
  alikeMinutes: number;
}

export interface SearchResult {
  /** Most alike first; at most `MOST_SPELLS`. */
  spells: Spell[];
  spellsFound: number;
  stations: SearchedStation[];
  pattern: Pattern;
  /** False: it stopped at its time's end. */
  isComplete: boolean;
  tookMs: number;
}
