import { badRequest } from './problem';

/** Bytes `first` to `last`, both of them included, of a whole of `wholeBytes` (RFC 9110, 14.4). */
export interface ContentRange {
  first: number;
  last: number;
  wholeBytes: number;
}

/** What a Content-Range header says of a part that is sent. @throws {Problem} 400 */
export function parseContentRange(header: string | null): ContentRange {
  const match = /^bytes (\d{1,15})-(\d{1,15})\/(\d{1,15})$/.exec(header ?? '');
  const [first = 0, last = -1, wholeBytes = 0] = (match ?? []).slice(1).map(Number);
  if (!match || first > last || last >= wholeBytes) {
    throw badRequest('Say which part this is, such as `Content-Range: bytes 0-1048575/5242880`.');
  }
  return { first, last, wholeBytes };
}
