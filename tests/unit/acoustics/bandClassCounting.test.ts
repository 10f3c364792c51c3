import fc from 'fast-check';
import { expect, test } from 'vitest';
import { countBandClasses, type BandInterval } from '#lib/acoustics/bandClassCounting';
import { bandSlot, bandsOf } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { octaveEnergiesOfThirds, octaveEnergyBuffer } from '#lib/acoustics/octaves';
import { emptyBandClasses, type BandClassCounts } from '#lib/acoustics/periodSums';
import { toTenths } from '#lib/acoustics/rounding';

const THIRDS = Int8Array.from(bandsOf(3).slice(2, 33), ({ index }) => index);
const FEW_THIRDS = THIRDS.slice(4, 9);
const OCTAVES = Int8Array.from(bandsOf(1), ({ index }) => index);

const interval = fc.constantFrom(THIRDS, FEW_THIRDS, OCTAVES).chain((bandIndices) =>
  fc.record({
    durationSec: fc.integer({ min: 1, max: 3600 }),
    bandFraction: fc.constant(bandIndices === OCTAVES ? (1 as const) : (3 as const)),
    bandIndices: fc.constant(bandIndices),
    levelsCentiDb: fc
      .array(
        fc.oneof(
          { weight: 9, arbitrary: fc.integer({ min: -3000, max: 20_000 }) },
          fc.constant(NO_LEVEL_CENTI_DB),
        ),
        {
          minLength: bandIndices.length,
          maxLength: bandIndices.length,
        },
      )
      .map((levels) => Int16Array.from(levels)),
  }),
);

test('band by band gives what interval by interval gives', () => {
  fc.assert(
    fc.property(fc.array(interval, { maxLength: 40 }), (intervals) => {
      const counted = emptyBandClasses();
      countBandClasses(intervals, counted);
      expect(bytesOf(counted)).toEqual(bytesOf(oneByOne(intervals)));
    }),
  );
});

test('a band that does not exist is refused', () => {
  const wrong = {
    durationSec: 1,
    bandFraction: 3,
    bandIndices: Int8Array.of(40),
    levelsCentiDb: Int16Array.of(1),
  } as const;
  expect(() => countBandClasses([wrong], emptyBandClasses())).toThrow(/not a band index/);
});

/** The definition: each interval's own levels, and the energy sums of its own thirds. */
function oneByOne(intervals: readonly BandInterval[]): BandClassCounts {
  const classes = emptyBandClasses();
  const energies = octaveEnergyBuffer();
  for (const { durationSec, bandFraction, bandIndices, levelsCentiDb } of intervals) {
    levelsCentiDb.forEach((centiDb, at) => {
      if (centiDb !== NO_LEVEL_CENTI_DB)
        classes.bands[bandSlot(bandIndices[at] ?? NaN)]?.add(centiDb, durationSec);
    });
    if (bandFraction !== 3) continue;
    octaveEnergiesOfThirds(levelsCentiDb, bandIndices, energies);
    energies.forEach((energy, slot) => {
      if (!Number.isNaN(energy))
        classes.octaves[slot]?.addTenths(toTenths(10 * Math.log10(energy)), durationSec);
    });
  }
  return classes;
}

function bytesOf({ bands, octaves }: BandClassCounts): number[][] {
  return [...bands, ...octaves].map((counts) => [...counts.encode()]);
}
