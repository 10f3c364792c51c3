import { inject } from 'vitest';

/** Nominal octaves 31.5 Hz–8 kHz. */
export const OCTAVES_HZ = [31.5, 63, 125, 250, 500, 1000, 2000, 4000, 8000];

/** One-minute intervals of one level from an instant (epoch seconds) on. */
export function minutes(fromSec: number, count: number, laeqDb: number) {
  return Array.from({ length: count }, (_, at) => ({
    start: new Date((fromSec + at * 60) * 1000).toISOString(),
    seconds: 60,
    LAeq: laeqDb,
    LAFmax: laeqDb + 6,
    levels: OCTAVES_HZ.map(() => laeqDb - 9),
  }));
}

/** Posts intervals as a monitor with this token would. */
export async function post(token: string, intervals: ReturnType<typeof minutes>): Promise<Response> {
  return fetch(`${inject('origin')}/api/v1/intervals`, {
    method: 'POST',
    headers: { Authorization: `Bearer ${token}`, 'Content-Type': 'application/json' },
    body: JSON.stringify({ bands: OCTAVES_HZ, intervals }),
  });
}
