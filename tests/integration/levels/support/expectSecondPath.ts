import { expect } from 'vitest';
import { bandsOf } from '#lib/acoustics/bands';
import { EXCEEDANCE_PERCENTS, type Statistics } from '#lib/contracts/levels';
import { expectSameLevel } from './desk';
import {
  bandLeq,
  bandSamples,
  broadband,
  exceeded,
  laeqSamples,
  octaveSamples,
  type Asked,
} from './secondPath';

/** Expects a station's broadband figures of a period to be those of the second path. */
export async function expectBroadband(figures: Statistics, asked: Asked, what: string): Promise<void> {
  const wanted = await broadband(asked);
  expect(figures.seconds, what).toEqual({
    expected: asked.toSec - asked.fromSec,
    valid: wanted.validSec,
    excluded: wanted.excludedSec,
  });
  expect(figures.coverage, what).toBe(wanted.validSec / (asked.toSec - asked.fromSec));
  expectSameLevel(figures.LAeq, wanted.laeqDb, `${what} LAeq`);
  expectSameLevel(figures.LCeq, wanted.lceqDb, `${what} LCeq`);
  expect(
    [figures.LAFmax, figures.LAFmin, figures.LCpeak, figures.sampleSeconds],
    `${what} LAFmax, LAFmin, LCpeak, sample`,
  ).toEqual([wanted.lafmaxDb, wanted.lafminDb, wanted.lcpeakDb, wanted.sampleSec]);
  const laeDb = wanted.laeqDb === null ? null : wanted.laeqDb + 10 * Math.log10(wanted.validSec);
  expectSameLevel(figures.LAE, laeDb, `${what} LAE`);
  const samples = await laeqSamples(asked);
  for (const percent of EXCEEDANCE_PERCENTS) {
    const level = exceeded(samples, percent, wanted.sampleSec);
    expect(figures.LAN[String(percent)], `${what} LA${percent}`).toBe(level);
  }
}

/** The same for a third by its band index. */
export async function expectThird(
  figures: Statistics,
  asked: Asked,
  index: number,
  what: string,
): Promise<void> {
  const nominalHz = bandsOf(3).find((band) => band.index === index)?.nominalHz;
  const band = figures.bands.find((one) => one.nominalHz === nominalHz);
  expectSameLevel(band?.Leq ?? null, await bandLeq(asked, index), `${what} ${nominalHz} Hz`);
  const samples = await bandSamples(asked, index);
  const wanted = [10, 50, 90].map((percent) => exceeded(samples, percent, figures.sampleSeconds));
  expect([band?.L10 ?? null, band?.L50 ?? null, band?.L90 ?? null], `${what} ${nominalHz} Hz`).toEqual(
    wanted,
  );
}

/** The same for an octave of a third-octave station: Leq is the sum of its thirds' Leq, L_N its own. */
export async function expectOctave(
  figures: Statistics,
  asked: Asked,
  index: number,
  what: string,
): Promise<void> {
  const nominalHz = bandsOf(1).find((band) => band.index === index)?.nominalHz;
  const octave = figures.octaves.find((one) => one.nominalHz === nominalHz);
  const thirds = await Promise.all([-1, 0, 1].map((offset) => bandLeq(asked, index + offset)));
  const known = thirds.filter((level) => level !== null);
  const sum = known.reduce((energy, level) => energy + 10 ** (level / 10), 0);
  const leqDb = known.length === 3 ? 10 * Math.log10(sum) : null;
  expectSameLevel(octave?.Leq ?? null, leqDb, `${what} octave ${nominalHz}`);
  const samples = await octaveSamples(asked, index);
  const wanted = [10, 50, 90].map((percent) => exceeded(samples, percent, figures.sampleSeconds));
  expect([octave?.L10 ?? null, octave?.L50 ?? null, octave?.L90 ?? null], `${what} octave`).toEqual(wanted);
}
