import { BAND_SLOTS } from './bands';
import { energyOfCentiDb, levelOfEnergyDb } from './energy';

/** Minutes of a day of UTC. */
export const DAY_MINUTES = 1440;
/** Marks a minute without a level, in hundredths of a dB. */
export const NO_LEVEL_CENTI_DB = -32768;
/** Steps of a dB that a shape is kept in: a band lies within 0.25 dB of what was measured, and so does a likeness. */
export const STEPS_A_DB = 2;
/** The step that stands for the minute's mean; 0 stands for no band. */
const MEAN_STEP = 128;
/** Thirds of a group of the outline. */
export const GROUP_THIRDS = 4;
/** Band slot that the first group begins at: 25 Hz. The last ends at 12.5 kHz. */
export const FIRST_GROUP_SLOT = 3;
export const OUTLINE_GROUPS = 7;
/** Stands in an outline for a group that lacks a band. */
export const NO_GROUP = 255;
/** A minute counts when at least half of it was measured. */
const LEAST_SEC = 30;
const HEAD_BYTES = 2;

/**
 * A station's day of minutes: LAeq, mean band level and the thirds about that mean, in half decibels. The outline has the means of
 * groups of four thirds about the minute's mean; a minute without bands has zeros.
 */
export interface DayTrace {
  firstSlot: number;
  slots: number;
  laeqCentiDb: Int16Array;
  meanCentiDb: Int16Array;
  /** `slots` steps a minute. */
  steps: Uint8Array;
  /** `OUTLINE_GROUPS` steps a minute. */
  outline: Uint8Array;
}

/** What a trace takes of an interval. */
export interface TracedInterval {
  laeqCentiDb: number;
  bandFraction: number;
  /** By `levelsCentiDb`: absolute slots of the bands. */
  slots: ArrayLike<number>;
  /** −32768 = none. */
  levelsCentiDb: Int16Array;
}

/** Adds intervals to the minutes of a day and makes its trace: energy means, weighted by duration. */
export class DayTraceBuilder {
  readonly #laeq = new Float64Array(DAY_MINUTES);
  readonly #laeqSec = new Float64Array(DAY_MINUTES);
  readonly #bands = new Float64Array(DAY_MINUTES * BAND_SLOTS);
  readonly #bandSec = new Float64Array(DAY_MINUTES * BAND_SLOTS);

  /** Adds an interval, from `fromSec` to `toSec` of the day. Octaves have no shape: likeness is of thirds. */
  add(interval: TracedInterval, fromSec: number, toSec: number): void {
    const last = Math.min(DAY_MINUTES - 1, Math.ceil(toSec / 60) - 1);
    for (let minute = Math.max(0, Math.floor(fromSec / 60)); minute <= last; minute += 1) {
      const sec = Math.min(toSec, minute * 60 + 60) - Math.max(fromSec, minute * 60);
      this.#laeq[minute] = (this.#laeq[minute] ?? 0) + sec * energyOfCentiDb(interval.laeqCentiDb);
      this.#laeqSec[minute] = (this.#laeqSec[minute] ?? 0) + sec;
      if (interval.bandFraction === 3) this.#addBands(interval, minute, sec);
    }
  }

  #addBands({ slots, levelsCentiDb }: TracedInterval, minute: number, sec: number): void {
    for (let band = 0; band < levelsCentiDb.length; band += 1) {
      const centiDb = levelsCentiDb[band] ?? NO_LEVEL_CENTI_DB;
      if (centiDb === NO_LEVEL_CENTI_DB) continue;
      const at = minute * BAND_SLOTS + (slots[band] ?? 0);
      this.#bands[at] = (this.#bands[at] ?? 0) + sec * energyOfCentiDb(centiDb);
      this.#bandSec[at] = (this.#bandSec[at] ?? 0) + sec;
    }
  }

  /** The trace; null when no minute counts. */
  trace(): DayTrace | null {
    const [firstSlot, endSlot] = this.#slotRange();
    const slots = endSlot - firstSlot;
    const trace: DayTrace = {
      firstSlot,
      slots,
      laeqCentiDb: new Int16Array(DAY_MINUTES).fill(NO_LEVEL_CENTI_DB),
      meanCentiDb: new Int16Array(DAY_MINUTES).fill(NO_LEVEL_CENTI_DB),
      steps: new Uint8Array(DAY_MINUTES * slots),
      outline: new Uint8Array(DAY_MINUTES * OUTLINE_GROUPS),
    };
    let isEmpty = true;
    for (let minute = 0; minute < DAY_MINUTES; minute += 1) {
      const sec = this.#laeqSec[minute] ?? 0;
      if (sec < LEAST_SEC) continue;
      isEmpty = false;
      trace.laeqCentiDb[minute] = centiDbOf((this.#laeq[minute] ?? 0) / sec);
      this.#shape(trace, minute, sec);
    }
    return isEmpty ? null : trace;
  }

  #slotRange(): [first: number, end: number] {
    const isUsed = (slot: number) => {
      for (let at = slot; at < this.#bandSec.length; at += BAND_SLOTS) if (this.#bandSec[at]) return true;
      return false;
    };
    let [first, end] = [0, BAND_SLOTS];
    while (first < end && !isUsed(first)) first += 1;
    while (end > first && !isUsed(end - 1)) end -= 1;
    return [first, end];
  }

  /** A band counts where it was measured as long as the level was. */
  #shape(trace: DayTrace, minute: number, sec: number): void {
    const levelsDb = Array.from({ length: trace.slots }, (_, slot) => {
      const at = minute * BAND_SLOTS + trace.firstSlot + slot;
      const has = (this.#bandSec[at] ?? 0) === sec;
      return has ? levelOfEnergyDb((this.#bands[at] ?? 0) / sec) : null;
    });
    const known = levelsDb.filter((levelDb) => levelDb !== null);
    if (known.length === 0) return;
    const meanDb = known.reduce((sum, levelDb) => sum + levelDb, 0) / known.length;
    trace.meanCentiDb[minute] = Math.round(meanDb * 100);
    levelsDb.forEach((levelDb, slot) => {
      if (levelDb !== null) trace.steps[minute * trace.slots + slot] = stepOf(levelDb - meanDb);
    });
    outlineMinute(trace, minute);
  }
}

function centiDbOf(energy: number): number {
  return Math.round((levelOfEnergyDb(energy) ?? 0) * 100);
}

function stepOf(aboveMeanDb: number): number {
  return Math.min(255, Math.max(1, Math.round(aboveMeanDb * STEPS_A_DB) + MEAN_STEP));
}

function outlineMinute(trace: DayTrace, minute: number): void {
  for (let group = 0; group < OUTLINE_GROUPS; group += 1) {
    let sum = 0;
    let count = 0;
    for (let third = 0; third < GROUP_THIRDS; third += 1) {
      const slot = FIRST_GROUP_SLOT + group * GROUP_THIRDS + third - trace.firstSlot;
      const step = slot < 0 || slot >= trace.slots ? 0 : (trace.steps[minute * trace.slots + slot] ?? 0);
      sum += step;
      if (step > 0) count += 1;
    }
    const mean = count === GROUP_THIRDS ? Math.round(sum / GROUP_THIRDS) : NO_GROUP;
    trace.outline[minute * OUTLINE_GROUPS + group] = mean;
  }
}

/** All of a trace but its outline as bytes: first slot, slots, levels, means (int16 LE), steps. */
export function packShapes({ firstSlot, slots, laeqCentiDb, meanCentiDb, steps }: DayTrace): Uint8Array {
  const bytes = new Uint8Array(HEAD_BYTES + 4 * DAY_MINUTES + steps.length);
  bytes[0] = firstSlot;
  bytes[1] = slots;
  bytes.set(new Uint8Array(laeqCentiDb.buffer), HEAD_BYTES);
  bytes.set(new Uint8Array(meanCentiDb.buffer), HEAD_BYTES + 2 * DAY_MINUTES);
  bytes.set(steps, HEAD_BYTES + 4 * DAY_MINUTES);
  return bytes;
}

/** The trace of packed bytes and its outline: a view of the bytes, as far as these lie evenly. */
export function unpackShapes(bytes: Uint8Array, outline: Uint8Array): DayTrace {
  const [firstSlot = 0, slots = 0] = bytes;
  const int16 = (from: number) => {
    const at = bytes.byteOffset + from;
    if (at % 2 === 0) return new Int16Array(bytes.buffer, at, DAY_MINUTES);
    const own = new Uint8Array(2 * DAY_MINUTES);
    own.set(bytes.subarray(from, from + 2 * DAY_MINUTES));
    return new Int16Array(own.buffer);
  };
  return {
    firstSlot,
    slots,
    laeqCentiDb: int16(HEAD_BYTES),
    meanCentiDb: int16(HEAD_BYTES + 2 * DAY_MINUTES),
    steps: bytes.subarray(HEAD_BYTES + 4 * DAY_MINUTES),
    outline,
  };
}
