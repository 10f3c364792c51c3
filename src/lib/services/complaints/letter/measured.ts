import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import { distanceInWords, type Wind } from '../whereabouts';
import { levelInWords, shareInWords } from './words';

/** Where a station stands, seen from the resident; null where the exact place is not known. */
export interface Whereabouts {
  distanceM: number;
  /** The wind towards which it lies. */
  wind: Wind;
  /** The same as a bearing, degrees clockwise of north. */
  bearingDeg: number;
}

/** What can be said of a station's data in the window. */
export type DataState = 'none' | 'partial' | 'enough';

export function dataState(station: StationEvidence): DataState {
  if (station.LAeq === null) return 'none';
  return station.meetsMinimum ? 'enough' : 'partial';
}

/** The station and where it stands: `Our station Ropewalk School, about 350 m to the north-east of you,`. */
export function introduced(noun: string, station: StationEvidence, whereabouts: Whereabouts | null): string {
  if (!whereabouts) return `${noun} ${station.name}${noun.endsWith(',') ? ',' : ''}`;
  const distance = distanceInWords(whereabouts.distanceM);
  if (distance.startsWith('at')) return `${noun} ${station.name}, ${distance},`;
  return `${noun} ${station.name}, ${distance} to the ${whereabouts.wind} of you,`;
}

/** What the station measured, or that it did not. */
export function measuredParagraph(
  noun: string,
  station: StationEvidence,
  whereabouts: Whereabouts | null,
  minimumCoverage: number,
): string {
  const who = introduced(noun, station, whereabouts);
  const state = dataState(station);
  if (state === 'none') return noData(who, station);
  if (state === 'partial') return partialData(who, station, minimumCoverage);
  return `${who} measured ${shareInWords(station.coverage)} of that time. ${levelsSentence(station)}`;
}

function levelsSentence(station: StationEvidence): string {
  const average = station.LAeq === null ? '' : `The average level there was ${levelInWords(station.LAeq)}`;
  const loudest =
    station.LAFmax === null ? '.' : `, and the loudest moment reached ${levelInWords(station.LAFmax)}.`;
  const spread =
    station.LA10 === null || station.LA90 === null
      ? ''
      : ` For nine tenths of the time it was ${levelInWords(station.LA90)} or more, for one tenth of the time ` +
        `${levelInWords(station.LA10)} or more.`;
  return `${average}${loudest}${spread}`;
}

function noData(who: string, station: StationEvidence): string {
  const why =
    station.seconds.excluded > 0
      ? 'has measurements of that time, but none that may be used: they are left out because of wind, rain, a check or a ' +
        'fault of the instrument, or work beside it'
      : 'has sent no measurements of that time so far';
  return `${who} ${why}. We can therefore neither confirm nor rule out what you heard, and missing data are not silence.`;
}

function partialData(who: string, station: StationEvidence, minimumCoverage: number): string {
  return (
    `${who} measured only ${shareInWords(station.coverage)} of that time usably, less than the ` +
    `${shareInWords(minimumCoverage)} that we ask for before a level is judged. In the part that was measured: ` +
    `${lowerFirst(levelsSentence(station))} This says nothing about the rest of the time, so we do not compare it with ` +
    'other weeks or with a limit.'
  );
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
