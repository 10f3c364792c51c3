import { describe, expect, test } from 'vitest';
import { bandByNominalHz, type BandFraction } from '#lib/acoustics/bands';
import { consistencyOf } from '#lib/acoustics/consistency';
import { cnelDb, ldnDb } from '#lib/acoustics/dayEveningNight';
import { energyMeanDb, energySumDb } from '#lib/acoustics/energy';
import { laeDb } from '#lib/acoustics/exposure';
import { laeqFromBandsDb } from '#lib/acoustics/laeqFromBands';
import { PeriodAccumulator, type AccumulatedInterval } from '#lib/acoustics/periodStatistics';
import { roundHalfUp, toCentiDb } from '#lib/acoustics/rounding';
import { spectrumBlocks } from '#lib/acoustics/spectrumBlocks';
import { assessTonality, surveyTones, thirdsTenthsOfCentiDb } from '#lib/acoustics/tonality';
import { aWeightOfBandDb, levelFromBandsDb } from '#lib/acoustics/weighting';
import { present, readCsv } from './support/fixtures';

/** Real, openly licensed measurements: fixtures/open-data, with their licences and NOTE.md beside them. */

function bandsOfColumns(fraction: BandFraction, names: readonly string[]) {
  return names.map((name) => present(bandByNominalHz(fraction, Number(name.slice(1))), `band ${name}`));
}

function interval(
  laeqDb: number,
  bandFraction: BandFraction,
  levelsCentiDb: Int16Array,
  bandIndices: Int8Array,
): AccumulatedInterval {
  return {
    durationSec: 1,
    sampleSec: 1,
    laeqCentiDb: toCentiDb(laeqDb),
    lafmaxCentiDb: null,
    lafminCentiDb: null,
    lceqCentiDb: null,
    lcpeakCentiDb: null,
    bandFraction,
    levelsCentiDb,
    bandIndices,
  };
}

describe('rural thirds, 1,200 s (github.com/nationalparkservice/NSNSDAcoustics exampleNVSPL, MIT)', () => {
  const [header, ...rows] = readCsv('open-data/nps_rivendell_thirds_1s.csv.gz');
  const bands = bandsOfColumns(3, present(header).slice(1, -1));
  const bandIndices = Int8Array.from(bands, (band) => band.index);
  const seconds = rows.map((row) => {
    const levelsDb = row.slice(1, -1).map(Number);
    const laeqDb = Number(row.at(-1));
    return { laeqDb, levelsDb, levelsCentiDb: Int16Array.from(levelsDb, toCentiDb) };
  });
  const figures = new PeriodAccumulator({ bandClasses: true });
  for (const { laeqDb, levelsCentiDb } of seconds)
    figures.add(interval(laeqDb, 3, levelsCentiDb, bandIndices), true);

  test('26 bands, 1,200 seconds', () => {
    expect([bands.length, seconds.length, figures.sums.validSec, figures.sums.sampleSec]).toEqual([
      26, 1200, 1200, 1,
    ]);
  });

  test('LAeq 50.47 dB; L10, L50, L90 within our rounding of samples to tenths (0.05 dB)', () => {
    expect(Math.abs(present(figures.laeqDb()) - 50.47)).toBeLessThan(0.005);
    for (const [percent, levelDb] of [
      [10, 54.8981],
      [50, 47.0506],
      [90, 44.165],
    ] as const) {
      expect(
        Math.abs(present(figures.exceedanceLevelDb(percent)) - levelDb),
        `L${percent}`,
      ).toBeLessThanOrEqual(0.05);
    }
  });

  test('the A-weighted sum of the bands is the reported A level every second, within 0.04 dB', () => {
    for (const { laeqDb, levelsDb, levelsCentiDb } of seconds) {
      // The source weighted with the table of whole tenths; analytic weights differ from it by up to 0.0489 dB (weights.json).
      const byTable = levelsDb.map(
        (levelDb, i) => levelDb + roundHalfUp(aWeightOfBandDb(present(bands[i]).index), 1),
      );
      expect(Math.abs(present(energySumDb(byTable)) - laeqDb)).toBeLessThan(0.04);
      const fromBandsDb = present(levelFromBandsDb(levelsDb, bands, 'A'));
      expect(Math.abs(fromBandsDb - laeqDb)).toBeLessThan(0.04 + 0.0489);
      expect(present(laeqFromBandsDb(3, levelsCentiDb, bandIndices))).toBeCloseTo(fromBandsDb, 9);
      expect(consistencyOf(toCentiDb(laeqDb), 3, levelsCentiDb, bandIndices).kind).toBe('consistent');
    }
  });

  test('birdsong makes 88 of the seconds tonal, mostly at 2.5 and 3.15 kHz', () => {
    const tonal = seconds
      .map(({ levelsCentiDb }) => surveyTones(thirdsTenthsOfCentiDb(levelsCentiDb, bandIndices)))
      .filter((findings) => findings.length > 0);
    expect(tonal).toHaveLength(88);
    const song = tonal.filter((findings) =>
      findings.some(({ lowerIndex }) => lowerIndex === 4 || lowerIndex === 5),
    );
    expect(song.length).toBeGreaterThan(44);
  });

  test('averaged to 60 s, as the method wants, twenty minutes are assessed', () => {
    const intervals = seconds.map(({ levelsCentiDb }, i) => ({ startSec: i, durationSec: 1, levelsCentiDb }));
    const blocks = spectrumBlocks(intervals, 60);
    expect(blocks.map((block) => [block.startSec, block.durationSec])).toEqual(
      Array.from({ length: 20 }, (_, i) => [60 * i, 60]),
    );
    const firstMinuteDb = energyMeanDb(seconds.slice(0, 60).map(({ levelsDb }) => present(levelsDb[10])));
    expect(present(blocks[0]?.levelsCentiDb[10]) / 100).toBeCloseTo(present(firstMinuteDb), 2);
  });

  test('octaves: 31.5 Hz–4 kHz whole, 8 kHz null because 10 kHz is missing', () => {
    expect(figures.octaveLeqDb(6)).not.toBeNull();
    expect(figures.octaveLeqDb(-15)).not.toBeNull();
    expect(figures.octaveLeqDb(9)).toBeNull();
  });
});

describe('roadside octaves, 0.1 s (github.com/cran/shinyHugePlot, J. Tagusari, MIT)', () => {
  const [header, ...rows] = readCsv('open-data/road_octaves_100ms.csv.gz');
  const bands = bandsOfColumns(1, present(header).slice(1));
  const bandIndices = Int8Array.from(bands, (band) => band.index);
  const bySecond = new Map<number, number[][]>();
  for (const [time, ...levels] of rows) {
    const second = Math.floor(Number(time));
    bySecond.set(second, [...(bySecond.get(second) ?? []), levels.map(Number)]);
  }
  const figures = new PeriodAccumulator({ bandClasses: true });
  for (const tenthsOfSecond of bySecond.values()) {
    if (tenthsOfSecond.length !== 10) continue;
    const levelsDb = bands.map((_, i) =>
      present(energyMeanDb(tenthsOfSecond.map((levels) => present(levels[i])))),
    );
    const laeqDb = present(levelFromBandsDb(levelsDb, bands, 'A'));
    figures.add(interval(laeqDb, 1, Int16Array.from(levelsDb, toCentiDb), bandIndices), true);
  }

  test('coverage of the hour with its 400 s gap is 88.9 %, not silence', () => {
    expect(rows).toHaveLength(32_001);
    expect(rows.length / 36_000).toBeCloseTo(0.889, 3);
    // Whole seconds: two at the gap and the last one are cut short, and one has 15 rows because the clock was set back.
    expect([...bySecond.values()].map((part) => part.length).filter((length) => length !== 10)).toEqual([
      15, 5, 6, 5,
    ]);
    expect(figures.sums.validSec).toBe(3197);
    const overAllSecondsDb = 10 * Math.log10(figures.sums.aEnergySec / 3600);
    expect(present(figures.laeqDb()) - overAllSecondsDb).toBeCloseTo(10 * Math.log10(3600 / 3197), 9);
  });

  test('octave Leq is the energy mean of the rows; octaves that were not measured are null', () => {
    bands.forEach((band, i) => {
      const whole = [...bySecond.values()].filter((part) => part.length === 10).flat();
      expect(present(figures.octaveLeqDb(band.index))).toBeCloseTo(
        present(energyMeanDb(whole.map((row) => present(row[i])))),
        2,
      );
    });
    expect(figures.octaveLeqDb(-9)).toBeNull();
    expect(figures.octaveExceedanceLevelDb(0, 10)).toBe(figures.bandExceedanceLevelDb(0, 10));
    expect(figures.octaveExceedanceLevelDb(0, 10)).not.toBeNull();
  });

  test('three octaves are too few for an LAeq, and octaves are not assessable for tones', () => {
    const levelsDb = bands.map((band) => figures.bandLeqDb(band.index));
    expect(
      laeqFromBandsDb(
        1,
        Int16Array.from(levelsDb, (levelDb) => toCentiDb(present(levelDb))),
        bandIndices,
      ),
    ).toBeNull();
    expect(assessTonality(1, levelsDb, bands, 3200)).toEqual({
      kind: 'not-assessable',
      reason: 'octave-bands',
    });
  });
});

describe('station-days near an air station (Jacuzzi et al. 2024, doi 10.1038/s41370-024-00670-1, BSD-3-Clause)', () => {
  const days = ['NPS', 'JGL'].flatMap((org) => {
    const [header, ...rows] = readCsv(`open-data/whidbey_cumulative_${org}.csv`);
    return rows.map((row) => new Map(present(header).map((name, i) => [name, row[i] ?? 'NA'])));
  });
  const valueOf = (day: Map<string, string>, name: string) => {
    const text = present(day.get(name), name);
    return text === 'NA' ? null : Number(text);
  };
  const hoursOf = (day: Map<string, string>) =>
    Array.from({ length: 24 }, (_, hour) => valueOf(day, `Leq${String(hour).padStart(2, '0')}`));
  const complete = days.flatMap((day) => {
    const hourly = hoursOf(day);
    const known = hourly.filter((level) => level !== null);
    return known.length === 24 && valueOf(day, 'Ldn') !== null ? [{ day, hourly: known }] : [];
  });
  const meanDb = (hourly: readonly number[], hours: readonly number[]) =>
    energyMeanDb(hours.map((hour) => present(hourly[hour])));
  const span = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => from + i);
  const night = [...span(22, 24), ...span(0, 7)];

  test('both files hold days with 24 hourly levels', () => expect(complete.length).toBeGreaterThan(50));

  test('Ldn and the 07/19/22 level of every such day within 0.01 dB', () => {
    for (const { day, hourly } of complete) {
      const nightDb = meanDb(hourly, night);
      const ldn = ldnDb({ day: meanDb(hourly, span(7, 22)), night: nightDb });
      const cnel = cnelDb({
        day: meanDb(hourly, span(7, 19)),
        evening: meanDb(hourly, span(19, 22)),
        night: nightDb,
      });
      expect(Math.abs(present(ldn) - present(valueOf(day, 'Ldn'))), day.get('Date')).toBeLessThan(0.01);
      expect(Math.abs(present(cnel) - present(valueOf(day, 'Lden'))), day.get('Date')).toBeLessThan(0.01);
    }
  });

  test('LAeq,24h and SEL of the days with all 86,400 s within 0.01 dB', () => {
    const full = complete.filter(({ day }) => valueOf(day, 'Measurements') === 86_400);
    expect(full.length).toBeGreaterThan(40);
    for (const { day, hourly } of full) {
      const laeqDb = present(energyMeanDb(hourly));
      expect(Math.abs(laeqDb - present(valueOf(day, 'Leq'))), day.get('Date')).toBeLessThan(0.01);
      expect(Math.abs(present(laeDb(laeqDb, 86_400)) - present(valueOf(day, 'SEL')))).toBeLessThan(0.06);
    }
  });

  test('days without any hour of the night have no Ldn, there or here', () => {
    const nightless = days.filter((day) => night.every((hour) => hoursOf(day)[hour] === null));
    expect(nightless.length).toBeGreaterThan(5);
    for (const day of nightless) {
      const known = (hours: readonly number[]) => hours.flatMap((hour) => hoursOf(day)[hour] ?? []);
      expect(ldnDb({ day: energyMeanDb(known(span(7, 22))), night: energyMeanDb(known(night)) })).toBeNull();
      expect(valueOf(day, 'Ldn'), day.get('Date')).toBeNull();
    }
  });
});
