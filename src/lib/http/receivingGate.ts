import type { TokenStation } from '#db/queries/stationTokens';
import { config } from '#lib/config/index';
import { Courtesy } from './courtesy';
import { FairShare, NoRoom, type TakeTurn } from './fairShare';
import { peopleUnderWay } from './peopleUnderWay';
import { Problem } from './problem';
import { addressKey, RateLimit } from './rateLimit';

/** Posts of one token that may be under way; a monitor needs one. */
const MOST_OF_TOKEN = 8;
const MOST_OF_ALL = 256;
const LONGEST_WAIT_MS = 10_000;
/** Connections that posts leave to people who read. */
const CONNECTIONS_LEFT = 4;
const MOST_TURNS = 6;
const TURNS_OF_TOKEN = 2;
const MOST_KNOWN = 20_000;
/** A token's use is noted once a minute, when it is asked for anew. */
const REMEMBERED_MS = 60_000;

/**
 * What every post of a monitor passes before it costs anything: the pace of its address and of its token, and a fair share of the
 * process. Each process keeps its own counts.
 */
class ReceivingGate {
  private readonly share: FairShare;
  private readonly paceOfAddress: RateLimit;
  private readonly paceOfToken: RateLimit;
  /** Stations of tokens that were in force when they last came. Other tokens share as their address does: inventing some gains nothing. */
  private readonly known = new Map<string, { station: TokenStation; atMs: number }>();

  constructor(settings = config()) {
    this.paceOfAddress = new RateLimit(settings.receiving.postsPerMinuteOfAddress);
    this.paceOfToken = new RateLimit(settings.receiving.postsPerMinuteOfToken);
    this.share = new FairShare({
      turnsAtOnce: Math.max(1, Math.min(MOST_TURNS, settings.database.poolMax - CONNECTIONS_LEFT)),
      turnsOfKey: TURNS_OF_TOKEN,
      mostOfKey: MOST_OF_TOKEN,
      mostOfAll: MOST_OF_ALL,
      longestWaitMs: LONGEST_WAIT_MS,
      isHeldBack: (largePosts) => courtesy.isHeldBack(largePosts),
    });
    const courtesy = new Courtesy(peopleUnderWay, () => this.share.goOn());
  }

  /** Lets a post in. @throws {Problem} 429 above the pace, or with too many of the token under way; 503 when all have too many. */
  async enter<T>(
    { address, secret }: { address: string; secret: string },
    work: (takeTurn: TakeTurn) => Promise<T>,
  ): Promise<T> {
    const nowMs = Date.now();
    const fromAddress = addressKey(address);
    requirePace(this.paceOfAddress.take(fromAddress, nowMs), 'address');
    const key = this.known.has(secret) ? secret : fromAddress;
    requirePace(this.paceOfToken.take(secret, nowMs), 'token');
    try {
      return await this.share.enter(key, work);
    } catch (error) {
      throw error instanceof NoRoom ? noRoom(error) : error;
    }
  }

  /** What was found by a token within the last minute; whether it is still so is to be asked. */
  recall(secret: string): TokenStation | null {
    const known = this.known.get(secret);
    return known && Date.now() - known.atMs < REMEMBERED_MS ? known.station : null;
  }

  /** Notes what was found by a token: its posts share by themselves from now on. */
  remember(secret: string, station: TokenStation): void {
    this.known.delete(secret);
    this.known.set(secret, { station, atMs: Date.now() });
    const [first] = this.known.keys();
    if (this.known.size > MOST_KNOWN && first !== undefined) this.known.delete(first);
  }

  forget(secret: string): void {
    this.known.delete(secret);
  }
}

let gate: ReceivingGate | undefined;

/** The process's gate. */
export function receivingGate(): ReceivingGate {
  gate ??= new ReceivingGate();
  return gate;
}

function requirePace(retryAfterSec: number, whose: 'address' | 'token'): void {
  if (retryAfterSec === 0) return;
  throw new Problem(
    429,
    `too-many-of-${whose}`,
    'Too many posts',
    `More posts came with this ${whose} than are taken. Keep the records and send more of them in one post.`,
    { headers: { 'Retry-After': String(retryAfterSec) } },
  );
}

function noRoom({ reason }: NoRoom): Problem {
  return reason === 'own'
    ? new Problem(
        429,
        'too-many-at-once',
        'Too many posts at once',
        'Wait for the answers to the posts that are under way. Keep the records.',
        { headers: { 'Retry-After': '1' } },
      )
    : new Problem(
        503,
        'busy',
        'Not possible at the moment',
        'More posts are waiting than can be taken. Keep the records and try again.',
        { headers: { 'Retry-After': '5' } },
      );
}
