import { bandByNominalHz, type BandFraction } from '#lib/acoustics/bands';
import { parseInstant } from '#lib/contracts/common';
import { intervalBatchSchema, MOST_INTERVALS } from '#lib/contracts/intervals';
import { parsePost } from './parsePost';

/** A post as far as it concerns all of its records. */
export interface Envelope {
  /** As sent, kept beside a refused record. */
  bands: number[];
  /** Absolute indices of the bands, or why no record can be read by them. */
  bandIndices: { indices: number[] } | { problem: string };
  intervals: unknown[];
  /** The monitor's clock when it sent, epoch seconds; null or left out where it did not say. */
  sentAtSec?: number | null;
}

/** No record of a post can be told from another, or there are too many. Nothing of it is kept. */
export class UnreadablePost extends Error {
  constructor(
    readonly kind: 'unreadable' | 'too-large',
    readonly detail: string,
  ) {
    super(detail);
    this.name = 'UnreadablePost';
  }
}

const unreadable = (detail: string) => new UnreadablePost('unreadable', detail);

/** Reads the envelope of a post, as its bytes came, for a station whose bands are of `fraction`. @throws {UnreadablePost} */
export async function readPost(bytes: Buffer, fraction: BandFraction): Promise<Envelope> {
  return envelopeOf(await parsePost(bytes).catch(notJson), fraction);
}

/** As `readPost`, of text. @throws {UnreadablePost} */
export function readEnvelope(text: string, fraction: BandFraction): Envelope {
  let body: unknown;
  try {
    body = JSON.parse(text);
  } catch (error) {
    notJson(error);
  }
  return envelopeOf(body, fraction);
}

function envelopeOf(body: unknown, fraction: BandFraction): Envelope {
  if (typeof body !== 'object' || body === null || Array.isArray(body)) {
    throw unreadable('The body is not a JSON object.');
  }
  const { intervals: list } = body as { intervals?: unknown };
  if (Array.isArray(list) && list.length > MOST_INTERVALS) {
    throw new UnreadablePost('too-large', `A post may have at most ${MOST_INTERVALS} intervals.`);
  }
  const envelope = intervalBatchSchema.safeParse(body);
  if (!envelope.success) {
    const problems = envelope.error.issues.map(({ path, message }) => `\`${path.join('.')}\` ${message}`);
    throw unreadable(`${problems.slice(0, 3).join('; ')}.`);
  }
  const { bands, intervals, sentAt } = envelope.data;
  const sentAtSec = sentAt ? parseInstant(sentAt) : null;
  return { bands, intervals, sentAtSec, bandIndices: indicesOf(bands, fraction) };
}

function notJson(error: unknown): never {
  throw error instanceof SyntaxError ? unreadable('The body is not JSON.') : error;
}

function indicesOf(bands: number[], fraction: BandFraction): Envelope['bandIndices'] {
  const kind = fraction === 3 ? 'one-third-octave' : 'octave';
  const indices: number[] = [];
  for (const hz of bands) {
    const band = bandByNominalHz(fraction, hz);
    if (!band) return { problem: `${hz} is not a nominal ${kind} frequency, which this station has.` };
    if (band.index <= (indices.at(-1) ?? -Infinity)) return { problem: 'Bands must ascend.' };
    indices.push(band.index);
  }
  return { indices };
}
