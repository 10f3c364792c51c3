import { describe, expect, test } from 'vitest';
import { bandAt, bandByNominalHz, bandsOf, type BandFraction } from '#lib/acoustics/bands';
import { octaveIndexOf, thirdsOfOctave } from '#lib/acoustics/octaves';
import { present, readJson } from './support/fixtures';

/** IEC 61260-1:2014 clauses 5.2–5.5, base ten; nominal values from public text (fixtures/reference/bands.json "source"). */
interface ExpectedBand {
  nominal_hz: number;
  exact_hz: number;
  lower_hz: number;
  upper_hz: number;
  base2: { centre_hz: number };
}
interface BandsFile {
  formulas: { G_base10: number };
  checks: {
    '250 Hz octave, base-10': { exact_hz: number; lower: number; upper: number; width: number };
    '250 Hz octave, base-2 edges from nominal': { expect_width_hz: number };
    'bandwidth ratio base10/base2 of the 250 Hz octave, dB (white noise)': number;
  };
  third_octave: (ExpectedBand & { n: number; octave_x: number; base2: { centre_vs_base10_pct: number } })[];
  octave: (ExpectedBand & { x: number; thirds_nominal_hz: number[] })[];
}

const file = readJson<BandsFile>('reference/bands.json');

/** Agreement of two frequencies to the seven digits that the file prints. */
function expectHz(actualHz: number, printedHz: number): void {
  expect(Math.abs(actualHz / printedHz - 1), `${actualHz} for ${printedHz} Hz`).toBeLessThan(1e-6);
}

function expectBand(fraction: BandFraction, index: number, wanted: ExpectedBand): void {
  const band = bandAt(fraction, index);
  expect(band.nominalHz).toBe(wanted.nominal_hz);
  expectHz(band.exactHz, wanted.exact_hz);
  expectHz(band.lowerHz, wanted.lower_hz);
  expectHz(band.upperHz, wanted.upper_hz);
  expect(bandByNominalHz(fraction, wanted.nominal_hz)).toBe(band);
}

describe('bands (IEC 61260-1:2014, fixtures/reference/bands.json)', () => {
  test.each(file.third_octave)('third $nominal_hz Hz', (wanted) => {
    expectBand(3, wanted.n, wanted);
    expect(octaveIndexOf(wanted.n)).toBe(3 * wanted.octave_x);
    // Base-two centres are 1 % off at the ends of the range; at 1 kHz both agree.
    if (Math.abs(wanted.base2.centre_vs_base10_pct) > 0.001) {
      expect(Math.abs(bandAt(3, wanted.n).exactHz / wanted.base2.centre_hz - 1)).toBeGreaterThan(5e-4);
    }
  });

  test.each(file.octave)('octave $nominal_hz Hz and its thirds', (wanted) => {
    expectBand(1, 3 * wanted.x, wanted);
    const thirds = thirdsOfOctave(3 * wanted.x).map((index) => bandAt(3, index));
    expect(thirds.map((third) => third.nominalHz)).toEqual(wanted.thirds_nominal_hz);
    expectHz(present(thirds[0]).lowerHz, wanted.lower_hz);
    expectHz(present(thirds[2]).upperHz, wanted.upper_hz);
  });

  test('the file and the core list the same bands', () => {
    expect(bandsOf(3).map((band) => band.index)).toEqual(file.third_octave.map((band) => band.n));
    expect(bandsOf(1).map((band) => band.index)).toEqual(file.octave.map((band) => 3 * band.x));
  });

  test('adjacent bands tile: the upper edge of one is the lower edge of the next', () => {
    for (const fraction of [1, 3] as const) {
      bandsOf(fraction).forEach((band, i, all) => {
        const next = all[i + 1];
        if (next) expect(next.lowerHz / band.upperHz).toBeCloseTo(1, 14);
      });
    }
  });

  test('250 Hz octave: base ten, not base two from the nominal frequency', () => {
    const octave = bandAt(1, -6);
    const wanted = file.checks['250 Hz octave, base-10'];
    const widthHz = octave.upperHz - octave.lowerHz;
    const base2WidthHz = file.checks['250 Hz octave, base-2 edges from nominal'].expect_width_hz;
    expectHz(octave.exactHz, wanted.exact_hz);
    expect(widthHz).toBeCloseTo(wanted.width, 3);
    expect(Math.abs(widthHz - base2WidthHz)).toBeGreaterThan(0.2);
    const ratioDb = file.checks['bandwidth ratio base10/base2 of the 250 Hz octave, dB (white noise)'];
    expect(10 * Math.log10(widthHz / base2WidthHz)).toBeCloseTo(ratioDb, 4);
  });

  test('the octave ratio is G = 10^0.3', () => {
    expect(bandAt(1, 3).exactHz / bandAt(1, 0).exactHz).toBeCloseTo(file.formulas.G_base10, 12);
  });
});
