import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import type { Standing } from '#lib/contracts/evidencePack';
import { dataState, type Whereabouts } from '../letter/measured';
import { shareInWords } from '../letter/words';
import { distanceInWords } from '../whereabouts';

/** Up to here a station is taken to hear much the same outdoors, metres. Bittern's own rule. */
const NEAR_M = 500;
/** Beyond this a station tells of another place, metres. Bittern's own rule. */
const AREA_M = 1500;
/** With less wind its direction tells nothing, m/s. */
const LEAST_WIND_MS = 1;
const SECTOR_DEG = 45;

/** How far a station may speak for the place, and each reason for and against. */
export function standingOf(station: StationEvidence, whereabouts: Whereabouts | null): Standing {
  const state = dataState(station);
  const reasons = [
    ...(whereabouts ? [distanceReason(whereabouts.distanceM)] : ['where the noise was heard is not known']),
    state === 'none'
      ? 'it has no usable measurements of that time'
      : `it measured ${shareInWords(station.coverage)} of that time usably${state === 'partial' ? ', too little to compare' : ''}`,
    ...windReason(station, whereabouts),
  ];
  return {
    station: station.station,
    distanceM: whereabouts?.distanceM ?? null,
    wind: whereabouts?.wind ?? null,
    bearingDeg: whereabouts?.bearingDeg ?? null,
    verdict: verdictOf(state === 'none', whereabouts),
    reasons,
  };
}

function verdictOf(isSilent: boolean, whereabouts: Whereabouts | null): Standing['verdict'] {
  if (isSilent) return 'no-data';
  if (!whereabouts) return 'unknown-place';
  if (whereabouts.distanceM <= NEAR_M) return 'near';
  return whereabouts.distanceM <= AREA_M ? 'area' : 'far';
}

function distanceReason(distanceM: number): string {
  const distance = distanceInWords(distanceM);
  if (distanceM <= NEAR_M) return `${distance} from the place: near enough to hear much the same outdoors`;
  if (distanceM <= AREA_M) return `${distance} from the place: it tells of the area, not of the place itself`;
  return `${distance} from the place: too far to tell what reached it`;
}

/** Sound carries further downwind, so it is said on which side of the wind the station was. */
function windReason({ context }: StationEvidence, whereabouts: Whereabouts | null): string[] {
  const wind = context?.wind;
  if (!whereabouts || !wind || wind.directionDeg === null || wind.mean < LEAST_WIND_MS) return [];
  const off = Math.abs(((wind.directionDeg - whereabouts.bearingDeg + 540) % 360) - 180);
  const mean = `${wind.mean.toFixed(1)} m/s`;
  if (off <= SECTOR_DEG) return [`the wind (${mean}) blew from the station towards the place`];
  if (off >= 180 - SECTOR_DEG) return [`the wind (${mean}) blew from the place towards the station`];
  return [`the wind (${mean}) blew across the line between them`];
}
