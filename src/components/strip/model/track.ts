import { type Band, type BandFraction } from '#lib/acoustics/bands';
import type { Statistics } from '#lib/contracts/levels';
import { type StripComplaint } from './complaintMarks';
import { type Corner } from './dragSelection';
import { type StripExceedance } from './exceedanceMarks';
import { type Interaction } from './interaction';
import { type StripLimit } from './limitLines';
import { type Run } from './runs';

/** One of the strips that stand under one another on one axis. */
export interface Track {
  station: { code: string; name: string; bandFraction: BandFraction; intervalSec: number };
  /** How much later its time is than the axis's: negative for an earlier period. */
  shiftSec: number;
  limits: StripLimit[];
  exceedances: StripExceedance[];
  complaints: StripComplaint[];
  /** Figures of the page's whole period, where they came with the page. */
  statistics?: Statistics;
}

/** A stretch of time moved later by some seconds, with whatever else it holds. */
export function shifted<T extends Run>(run: T, bySec: number): T {
  return bySec === 0 ? run : { ...run, fromSec: run.fromSec + bySec, toSec: run.toSec + bySec };
}

/** Place in `to` of the band at a place in `from`; null where `to` has no such band. */
export function bandPlaceIn(at: number, from: readonly Band[], to: readonly Band[]): number | null {
  const band = from[at];
  const place = to.findIndex(({ index, fraction }) => index === band?.index && fraction === band.fraction);
  return place < 0 ? null : place;
}

/** Where two strips' marks differ: their time, and the lists that their bands' places are of. */
export interface TrackStep {
  bySec: number;
  from: readonly Band[];
  to: readonly Band[];
}

/** A corner on one strip as the same corner on another. */
export function cornerOn({ sec, bandAt }: Corner, { bySec, from, to }: TrackStep): Corner {
  return { sec: sec + bySec, bandAt: bandAt === null ? null : bandPlaceIn(bandAt, from, to) };
}

/** What is marked on one strip as the same marks on another. */
export function interactionOn(interaction: Interaction, step: TrackStep): Interaction {
  const { cursor, anchor, selection } = interaction;
  return {
    ...interaction,
    cursor: cursor && cornerOn(cursor, step),
    anchor: anchor && cornerOn(anchor, step),
    selection: selection && shifted(selection, step.bySec),
  };
}
