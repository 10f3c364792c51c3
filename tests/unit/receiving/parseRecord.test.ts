import fc from 'fast-check';
import { expect, test } from 'vitest';
import { bandRange } from '#lib/acoustics/bands';
import { FLAG_NAMES } from '#lib/acoustics/validity';
import { BOUNDS, postedIntervalSchema } from '#lib/contracts/intervals';
import { parseRecord, Refusal, type BandLayout } from '#ingest/receive/parseRecord';

const BANDS: BandLayout = {
  fraction: 3,
  indices: Int8Array.from(bandRange(3, 100, 200), ({ index }) => index),
};

/** Any value that JSON can have, often one at or beside a bound. */
const near = ([lowest, highest]: readonly [number, number]) =>
  fc.oneof(
    fc.double({ min: lowest, max: highest, noNaN: true }),
    fc.constantFrom(lowest, highest, lowest - 0.01, highest + 0.01, lowest + 1, 0, -0),
  );
const strange = fc.oneof(
  fc.constantFrom(null, true, false, '', '52.3', '__proto__'),
  fc.array(fc.integer(), { maxLength: 2 }),
  fc.dictionary(fc.string(), fc.integer(), { maxKeys: 2 }),
  fc.double({ noNaN: true, noDefaultInfinity: true }),
);
const field = (bounds: readonly [number, number]) =>
  fc.oneof({ weight: 12, arbitrary: near(bounds) }, { weight: 1, arbitrary: strange });

const record = fc.record(
  {
    seconds: fc.oneof(
      { weight: 12, arbitrary: fc.integer({ min: 1, max: 3600 }) },
      { weight: 2, arbitrary: fc.constantFrom(0, 3601, 1.5, -1) },
      { weight: 1, arbitrary: strange },
    ),
    LAFmax: field(BOUNDS.level),
    LAFmin: field(BOUNDS.level),
    LCeq: field(BOUNDS.level),
    LCpeak: field(BOUNDS.level),
    levels: fc.oneof(
      {
        weight: 12,
        arbitrary: fc.array(
          fc.oneof({ weight: 20, arbitrary: near(BOUNDS.level) }, { weight: 1, arbitrary: strange }),
          {
            minLength: BANDS.indices.length,
            maxLength: BANDS.indices.length,
          },
        ),
      },
      { weight: 1, arbitrary: fc.constantFrom(null, 'none', 4, {}) },
    ),
    flags: fc.oneof(
      { weight: 6, arbitrary: fc.subarray([...FLAG_NAMES]) },
      { weight: 1, arbitrary: fc.constantFrom(null, ['bogus'], [1], 'rain', ['toString']) },
    ),
    windSpeed: field(BOUNDS.windSpeed),
    windDirection: field(BOUNDS.windDirection),
    temperature: field(BOUNDS.temperature),
    battery: field(BOUNDS.battery),
  },
  { requiredKeys: [] },
);

function isTaken(posted: unknown): boolean {
  try {
    parseRecord(posted, BANDS);
    return true;
  } catch (error) {
    expect(error).toBeInstanceOf(Refusal);
    return false;
  }
}

test(
  'the receiver’s own check takes a record exactly when the contract’s schema does',
  { timeout: 60_000 },
  () => {
    fc.assert(
      fc.property(record, (fields) => {
        // As it arrives: what JSON cannot say is not there.
        const posted: unknown = JSON.parse(
          JSON.stringify({ start: '2026-03-01T00:00:00Z', LAeq: 52.3, ...fields }),
        );
        expect(isTaken(posted)).toBe(postedIntervalSchema.safeParse(posted).success);
      }),
      { numRuns: 1000 },
    );
  },
);

test('what is taken is stored as sent, in whole hundredths', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: -3000, max: 20_000 }), { minLength: 4, maxLength: 4 }),
      fc.integer({ min: -3000, max: 20_000 }),
      (levels, laeq) => {
        const posted = {
          start: '2026-03-01T01:00:00+01:00',
          seconds: 60,
          LAeq: laeq / 100,
          levels: levels.map((level) => level / 100),
        };
        const parsed = parseRecord(JSON.parse(JSON.stringify(posted)), BANDS);
        expect(parsed).toMatchObject({
          startSec: Date.UTC(2026, 2, 1) / 1000,
          laeqCentiDb: laeq,
          durationSec: 60,
        });
        expect([...parsed.levelsCentiDb]).toEqual(levels);
      },
    ),
  );
});
