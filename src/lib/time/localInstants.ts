import { FixedOffsetZone, IANAZone, type Zone } from 'luxon';

const DAY_MS = 86_400_000;
const STEP_MS = 900_000;
const MOST_REMEMBERED = 20_000;
const FIXED = /^UTC(?:([+-])(\d{1,2})(?::(\d{2}))?)?$/;

/** A zone by its IANA name, or a clock that never changes as `UTC`, `UTC+1`, `UTC+05:30`; null for anything else. */
export function zoneNamed(name: string): Zone | null {
  const fixed = FIXED.exec(name);
  if (!fixed) return IANAZone.isValidZone(name) ? IANAZone.create(name) : null;
  const minutes = Number(fixed[2] ?? 0) * 60 + Number(fixed[3] ?? 0);
  return minutes > 14 * 60 ? null : FixedOffsetZone.instance(fixed[1] === '-' ? -minutes : minutes);
}

/**
 * Finds instants by what the clock on the wall showed, in one zone. Made for files of millions of times: offsets are
 * remembered by quarter-hour, because no zone changes its clock within one.
 */
export class LocalInstants {
  private readonly offsetsMs = new Map<number, number>();

  constructor(private readonly zone: Zone) {}

  /**
   * Every instant (epoch ms) at which the wall showed this time, given as the epoch ms that it would have in UTC: one, or none
   * where the clock was put forward over it, or two where it was put back.
   */
  at(wallMs: number): number[] {
    const offsets = new Set([this.offsetAt(wallMs - DAY_MS), this.offsetAt(wallMs + DAY_MS)]);
    return [...offsets]
      .filter((offsetMs) => this.offsetAt(wallMs - offsetMs) === offsetMs)
      .map((offsetMs) => wallMs - offsetMs)
      .sort((a, b) => a - b);
  }

  private offsetAt(ms: number): number {
    const step = Math.floor(ms / STEP_MS);
    const known = this.offsetsMs.get(step);
    if (known !== undefined) return known;
    if (this.offsetsMs.size > MOST_REMEMBERED) this.offsetsMs.clear();
    const offsetMs = this.zone.offset(ms) * 60_000;
    this.offsetsMs.set(step, offsetMs);
    return offsetMs;
  }
}
