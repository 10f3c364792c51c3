import type { BandSet } from '#db/queries/bandSets';
import type { StoredInterval } from '#db/queries/intervals';
import { formatInstantUtc } from '#lib/contracts/common';
import { findDifference } from './compare';
import { Occupied } from './occupied';
import { Refusal, storedFlags, type ParsedInterval } from './parseRecord';
import type { Candidate, Refused } from './readRecords';

export interface Decision {
  accepted: StoredInterval[];
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
}

/** Compares candidates with what is stored and, in the order of their post, with one another. */
export function decide(candidates: readonly Candidate[], circumstances: Circumstances): Decision {
  const { bandSet, receivedAtSec } = circumstances;
  const decision: Decision = { accepted: [], knownCount: 0, refused: [] };
  const known = new Map<number, StoredInterval>();
  const occupied = new Occupied();
  const note = (interval: StoredInterval) => {
    known.set(interval.startSec, interval);
    occupied.add(interval.startSec, interval.startSec + interval.durationSec);
  };
  circumstances.stored.forEach(note);
  for (const { index, interval } of candidates) {
    const same = known.get(interval.startSec);
    const difference = same ? findDifference(interval, bandSet, same) : null;
    if (same && difference === null) {
      decision.knownCount += 1;
      continue;
    }
    const refusal = refusalOf(interval, difference, occupied, circumstances.acceptsFromSec);
    if (refusal) {
      decision.refused.push({ index, refusal });
      continue;
    }
    const accepted = asStored(interval, bandSet, receivedAtSec);
    note(accepted);
    decision.accepted.push(accepted);
  }
  return decision;
}

function refusalOf(
  { startSec, durationSec }: ParsedInterval,
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

function asStored(interval: ParsedInterval, bandSet: BandSet, receivedAtSec: number): StoredInterval {
  return {
    ...interval,
    flags: storedFlags(interval),
    bandSetId: bandSet.id,
    bandFraction: bandSet.fraction,
    bandIndices: bandSet.indices,
    receivedAtSec,
  };
}
