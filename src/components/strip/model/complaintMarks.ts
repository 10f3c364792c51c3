import type { ComplaintKind } from '#lib/contracts/complaints';
import { KIND_WORDS } from '../../complaints/words';
import { type Run } from './runs';
import { stretchWords } from './timeWords';

/** A complaint as the strip marks it: nothing about the person or the place. The stretch is when the sound was heard. */
export interface StripComplaint extends Run {
  reference: string;
  kind: ComplaintKind;
}

/** "Complaint MER-2026-0012, rumble, heard Tue 17 Mar 03:30–04:10"; of several how many, and from when on. */
export function complaintMarkWords(held: readonly StripComplaint[], zone: string): string {
  const [first] = held;
  if (!first) return '';
  if (held.length > 1) return `${held.length} complaints from ${stretchWords(first, zone)}`;
  return `Complaint ${first.reference}, ${KIND_WORDS[first.kind].toLowerCase()}, heard ${stretchWords(first, zone)}`;
}
