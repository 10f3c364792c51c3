import { timingSafeEqual } from 'node:crypto';
import { notFound } from './problem';

const LOOPBACK = /^(127\.|::1$|::ffff:127\.)/;

/** Lets in a caller on loopback or with the token. @throws {Problem} 404 for everybody else. */
export function requireOperationsAccess(request: Request, clientAddress: string, token: string | null): void {
  if (LOOPBACK.test(clientAddress)) return;
  const given = /^Bearer (.+)$/.exec(request.headers.get('authorization') ?? '')?.[1];
  if (token === null || given === undefined || !isSame(given, token)) throw notFound();
}

function isSame(given: string, expected: string): boolean {
  const [a, b] = [Buffer.from(given), Buffer.from(expected)];
  return a.length === b.length && timingSafeEqual(a, b);
}
