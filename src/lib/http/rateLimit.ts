const MOST_KEYS = 20_000;
/** What may come at once, as seconds of the steady pace. */
const BURST_SEC = 10;

interface Bucket {
  left: number;
  atMs: number;
}

/** A steady pace for each key (an address, a token), above which one is asked to wait; a pause earns ten seconds' worth at once. */
export class RateLimit {
  private readonly buckets = new Map<string, Bucket>();
  private readonly perMs: number;
  private readonly most: number;

  constructor(perMinute: number) {
    this.perMs = perMinute / 60_000;
    this.most = Math.max(1, (perMinute / 60) * BURST_SEC);
  }

  /** Counts one of a key. @returns 0 when it may go on, else the seconds after which the next one may. */
  take(key: string, nowMs: number): number {
    const bucket = this.buckets.get(key) ?? { left: this.most, atMs: nowMs };
    const left = Math.min(this.most, bucket.left + Math.max(0, nowMs - bucket.atMs) * this.perMs);
    const isAllowed = left >= 1;
    this.keep(key, { left: isAllowed ? left - 1 : left, atMs: nowMs });
    return isAllowed ? 0 : Math.max(1, Math.ceil((1 - left) / this.perMs / 1000));
  }

  /** Keys are kept in the order of their last use, so that the first is the one to forget. */
  private keep(key: string, bucket: Bucket): void {
    this.buckets.delete(key);
    this.buckets.set(key, bucket);
    if (this.buckets.size <= MOST_KEYS) return;
    const [first] = this.buckets.keys();
    if (first !== undefined) this.buckets.delete(first);
  }
}

/** The key of a client's address: itself, or the /64 of an IPv6 address, all of which one client usually has. */
export function addressKey(address: string): string {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1];
  if (mapped !== undefined) return mapped;
  if (!address.includes(':')) return address;
  const [head = '', tail] = address.split('::');
  const groups = head.split(':').filter((group) => group !== '');
  const tailGroups = (tail ?? '').split(':').filter((group) => group !== '');
  const zeros = tail === undefined ? 0 : Math.max(0, 8 - groups.length - tailGroups.length);
  const all = [...groups, ...Array<string>(zeros).fill('0'), ...tailGroups];
  return all
    .slice(0, 4)
    .map((group) => group.replace(/^0+(?=.)/, '').toLowerCase())
    .join(':');
}
