import { describe, expect, it } from 'vitest';
import { timeTicks } from '../../../src/components/strip/model/timeTicks';

const sec = (iso: string) => Date.parse(iso) / 1000;
const LONDON = 'Europe/London';

describe('marks on the time axis', () => {
  it('fall on the local clock and name the date at midnight', () => {
    const ticks = timeTicks(
      { fromSec: sec('2026-03-17T12:00Z'), toSec: sec('2026-03-18T12:00Z') },
      780,
      LONDON,
    );
    expect(ticks.map((t) => t.label)).toEqual([
      '12:00',
      '14:00',
      '16:00',
      '18:00',
      '20:00',
      '22:00',
      'Wed 18 Mar',
      '02:00',
      '04:00',
      '06:00',
      '08:00',
      '10:00',
    ]);
  });

  it('stay on the local clock after the spring change', () => {
    const ticks = timeTicks(
      { fromSec: sec('2026-03-28T18:00Z'), toSec: sec('2026-03-29T18:00Z') },
      320,
      LONDON,
    );
    expect(ticks.map((t) => t.label)).toEqual(['18:00', 'Sun 29 Mar', '06:00', '12:00', '18:00']);
    expect((ticks[2]?.sec ?? 0) - (ticks[1]?.sec ?? 0)).toBe(5 * 3600);
  });

  it('show the hour that the autumn change repeats twice', () => {
    const ticks = timeTicks(
      { fromSec: sec('2026-10-24T23:30Z'), toSec: sec('2026-10-25T04:00Z') },
      400,
      LONDON,
    );
    expect(ticks.map((t) => t.label)).toEqual(['01:00', '01:00', '02:00', '03:00']);
  });

  it('skip the hour that the spring change leaves out', () => {
    const ticks = timeTicks(
      { fromSec: sec('2026-03-28T23:30Z'), toSec: sec('2026-03-29T03:30Z') },
      320,
      LONDON,
    );
    expect(ticks.map((t) => t.label)).toEqual(['Sun 29 Mar', '02:00', '03:00', '04:00']);
  });

  it('are dates over a month, as many as have room', () => {
    const ticks = timeTicks(
      { fromSec: sec('2026-03-01T00:00Z'), toSec: sec('2026-04-01T00:00Z') },
      780,
      LONDON,
    );
    expect(ticks.length).toBeGreaterThan(3);
    expect(ticks.every((t) => t.kind === 'day')).toBe(true);
    for (let i = 1; i < ticks.length; i += 1) {
      expect((ticks[i]?.sec ?? 0) - (ticks[i - 1]?.sec ?? 0)).toBeGreaterThan((31 * 86_400 * 62) / 780);
    }
  });
});
