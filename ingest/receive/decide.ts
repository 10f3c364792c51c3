import type { BandSet } from '#db/queries/bandSets';
import type { StoredInterval } from '#db/queries/intervals';
import { formatInstantUtc } from '#lib/contracts/common';
import { isFrom, placesOf, type ClockRules, type Place } from './clockRules';
import { findDifference } from './compare';
import { Occupied } from './occupied';
import { Refusal, storedFlags, type ParsedInterval } from './parseRecord';
import type { Candidate, Refused } from './readRecords';

export interface Decision {
  accepted: StoredInterval[];
  /** Places in the post of the accepted ones, beside them. */
  acceptedIndices: number[];
  /** Accepted ones that a shift of the clock puts elsewhere than their monitor says, by their stored start. */
  shifted: { startSec: number; shiftId: number }[];
  knownCount: number;
  refused: Refused[];
}

interface Circumstances {
  /** What is stored where the candidates lie, ascending. */
  stored: readonly StoredInterval[];
  bandSet: BandSet;
  /** Epoch seconds before which the station takes nothing new; null: no bound. */
  acceptsFromSec: number | null;
  receivedAtSec: number;
  /** Shifts of the clock that concern the candidates; left out or null: none does. */
  clock?: ClockRules | null;
}

/** Compares candidates with what is stored and, in the order of their post, with one another. */
export function decide(candidates: readonly Candidate[], circumstances: Circumstances): Decision {
  const { bandSet, receivedAtSec, clock = null } = circumstances;
  const decision: Decision = { accepted: [], acceptedIndices: [], shifted: [], knownCount: 0, refused: [] };
  const known = new Map<number, StoredInterval>();
  const newlyShifted = new Map<number, number>();
  const occupied = new Occupied();
  const note = (interval: StoredInterval) => {
    known.set(interval.startSec, interval);
    occupied.add(interval.startSec, interval.startSec + interval.durationSec);
  };
  circumstances.stored.forEach(note);
  const refusalAt = (interval: ParsedInterval, { startSec }: Place) => {
    const same = known.get(startSec);
    const difference = same ? findDifference(interval, bandSet, same) : null;
    return refusalOf(
      { startSec, durationSec: interval.durationSec },
      difference,
      occupied,
      circumstances.acceptsFromSec,
    );
  };
  const isKnownAt = (interval: ParsedInterval, place: Place) => {
    const same = known.get(place.startSec);
    if (!same || findDifference(interval, bandSet, same) !== null) return false;
    const shiftId = newlyShifted.get(place.startSec);
    return shiftId === undefined ? isFrom(place, clock) : shiftId === place.shiftId;
  };
  for (const { index, interval } of candidates) {
    const places = placesOf(interval, clock);
    if (places.some((place) => isKnownAt(interval, place))) {
      decision.knownCount += 1;
      continue;
    }
    const refusals = places.map((place) => refusalAt(interval, place));
    const place = places[refusals.indexOf(null)];
    const [refusal] = refusals;
    if (!place) {
      if (refusal) decision.refused.push({ index, refusal });
      continue;
    }
    const accepted = asStored(interval, place.startSec, bandSet, receivedAtSec);
    note(accepted);
    decision.accepted.push(accepted);
    decision.acceptedIndices.push(index);
    if (place.shiftId === null) continue;
    decision.shifted.push({ startSec: place.startSec, shiftId: place.shiftId });
    newlyShifted.set(place.startSec, place.shiftId);
  }
  return decision;
}

function refusalOf(
  { startSec, durationSec }: Pick<ParsedInterval, 'startSec' | 'durationSec'>,
  difference: string | null,
  occupied: Occupied,
  acceptsFromSec: number | null,
): Refusal | null {
  if (acceptsFromSec !== null && startSec < acceptsFromSec) {
    return new Refusal('too-old', `The station takes intervals from ${formatInstantUtc(acceptsFromSec)} on.`);
  }
  if (difference !== null) {
    return new Refusal(
      'conflict',
      `Another interval with this start is stored; \`${difference}\` differs. The stored one stays.`,
    );
  }
  return occupied.overlaps(startSec, startSec + durationSec)
    ? new Refusal('overlap', 'The interval overlaps another one that is stored.')
    : null;
}

function asStored(
  interval: ParsedInterval,
  startSec: number,
  bandSet: BandSet,
  receivedAtSec: number,
): StoredInterval {
  // Field by field: copying all of an object's fields at once costs ten times as much.
  return {
    startSec,
    durationSec: interval.durationSec,
    laeqCentiDb: interval.laeqCentiDb,
    lafmaxCentiDb: interval.lafmaxCentiDb,
    lafminCentiDb: interval.lafminCentiDb,
    lceqCentiDb: interval.lceqCentiDb,
    lcpeakCentiDb: interval.lcpeakCentiDb,
    levelsCentiDb: interval.levelsCentiDb,
    windSpeedMs: interval.windSpeedMs,
    windDirectionDeg: interval.windDirectionDeg,
    temperatureC: interval.temperatureC,
    batteryV: interval.batteryV,
    flags: storedFlags(interval),
    bandSetId: bandSet.id,
    bandFraction: bandSet.fraction,
    bandIndices: bandSet.indices,
    receivedAtSec,
  };
}
