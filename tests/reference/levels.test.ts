import { describe, expect, test } from 'vitest';
import { subtractBackgroundDb } from '#lib/acoustics/background';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import {
  cnelDb,
  DEFAULT_SCHEME,
  ldenDb,
  ldnDb,
  nominalHoursOf,
  schemeProblem,
  type PeriodScheme,
} from '#lib/acoustics/dayEveningNight';
import { energyMeanDb, energySumDb } from '#lib/acoustics/energy';
import { laeDb, laeqOfExposuresDb } from '#lib/acoustics/exposure';
import { l10of18hDb } from '#lib/acoustics/l10of18h';
import { NATIONAL_SCHEMES } from '#lib/acoustics/nationalSchemes';
import { roundHalfUp } from '#lib/acoustics/rounding';
import { present, readJson } from './support/fixtures';

/** One entry of fixtures/reference/levels.json; `source` and `status` say where its values come from. */
interface Example {
  id: string;
  what: string;
  input: unknown;
  expect: unknown;
  published?: unknown;
  tolerance_vs_published_dB?: number;
  wrong_results_to_catch?: Record<string, number | string>;
  source: string;
}
interface Period {
  state: string;
  day: string;
  evening: string | null;
  night: string;
  hours: [number, number, number];
  status: string;
}

const { examples, periods } = readJson<{ examples: Example[]; periods: Period[] }>('reference/levels.json');
const checked = new Set<string>();

/** The example of that id; its name and source become the test's. */
function check(id: string, verify: (example: Example) => void): void {
  const example = present(
    examples.find((candidate) => candidate.id === id),
    id,
  );
  checked.add(id);
  test(`${id}: ${example.what} (${example.source})`, () => verify(example));
}

function expectNear(actual: number | null, wanted: unknown, tolerance = 1e-4): void {
  expect(Math.abs(present(actual) - Number(wanted)), `${actual} for ${String(wanted)}`).toBeLessThanOrEqual(
    tolerance,
  );
}

/** The value, the published value within its tolerance, and none of the wrong ones. */
function expectLevel(actual: number | null, example: Example): void {
  expectNear(actual, example.expect);
  if (example.published !== undefined)
    expectNear(actual, example.published, example.tolerance_vs_published_dB);
  for (const [mistake, wrong] of Object.entries(example.wrong_results_to_catch ?? {})) {
    expect(Math.abs(present(actual) - Number(wrong)), mistake).toBeGreaterThan(0.3);
  }
}

function countsOf(levels: readonly [levelDb: number, sec: number][]): LevelClassCounts {
  const counts = new LevelClassCounts();
  for (const [levelDb, sec] of levels) counts.add(levelDb * 100, sec);
  return counts;
}

describe('energy sums and means', () => {
  for (const id of ['sum-3', 'sum-2', 'sum-equal']) {
    check(id, (example) => expectLevel(energySumDb(example.input as number[]), example));
  }
  for (const id of ['avg-3', 'leq-4x15min', 'leq-60-80']) {
    check(id, (example) => expectLevel(energyMeanDb(example.input as number[]), example));
  }
  check('leq-unequal', (example) => {
    const { levels, minutes } = example.input as { levels: number[]; minutes: number[] };
    expectLevel(energyMeanDb(levels, minutes), example);
  });
  check('year-average', (example) => {
    const { energy_mean } = example.expect as { energy_mean: number };
    expectLevel(energyMeanDb(example.input as number[]), { ...example, expect: energy_mean });
  });
  check('coverage-zero-fill', (example) => {
    const { valid, elapsed, level } = example.input as { valid: number; elapsed: number; level: number };
    const { Leq_valid, coverage } = example.expect as { Leq_valid: number; coverage: number };
    expectLevel(energyMeanDb(new Array<number>(valid).fill(level)), { ...example, expect: Leq_valid });
    expect(valid / elapsed).toBe(coverage);
  });
});

describe('residual sound', () => {
  for (const id of ['sub-1', 'sub-10dB']) {
    check(id, (example) => {
      const { measured, residual } = example.input as { measured: number; residual: number };
      const result = subtractBackgroundDb(measured, residual);
      expectLevel(result.kind === 'corrected' ? result.levelDb : null, example);
    });
  }
  check('sub-3dB', (example) => {
    const { corrected_informative, reportable } = example.expect as Record<string, number>;
    const result = subtractBackgroundDb(53, 50);
    expect(result).toMatchObject({ kind: 'refused', reason: 'within-3-db', upperBoundDb: reportable });
    expectNear(result.kind === 'refused' ? result.informativeDb : null, corrected_informative);
  });
  check('sub-neg', (example) => {
    const { measured, residual } = example.input as { measured: number; residual: number };
    expect(subtractBackgroundDb(measured, residual)).toEqual({
      kind: 'refused',
      reason: 'not-below',
      upperBoundDb: measured,
      informativeDb: example.expect,
    });
  });
});

describe('sound exposure', () => {
  for (const id of ['1s', '1min', '15min', '1h', '8h', '16h', '24h']) {
    check(`sel-T-${id}`, (example) => {
      const { LAeq, T_s } = example.input as { LAeq: number; T_s: number };
      expectLevel(laeDb(LAeq, T_s), example);
    });
  }
  check('sel-events', (example) => {
    const { N, SEL, T_s } = example.input as { N: number; SEL: number; T_s: number };
    expectLevel(laeqOfExposuresDb(new Array<number>(N).fill(SEL), T_s), example);
  });
  check('sel-mix', (example) => {
    const wanted = example.expect as { all: number; cars_only: number };
    const trucks = new Array<number>(2000).fill(80);
    const cars = new Array<number>(18000).fill(65);
    expectNear(laeqOfExposuresDb([...trucks, ...cars], 86_400), wanted.all);
    expectNear(laeqOfExposuresDb(cars, 86_400), wanted.cars_only);
  });
});

/** Mean of the hours `from`…`to` (exclusive) of a day's 24 hourly levels, dB. */
function hoursMeanDb(hourly: readonly number[], from: number, to: number): number {
  const hours = from < to ? hourly.slice(from, to) : [...hourly.slice(from), ...hourly.slice(0, to)];
  return present(energyMeanDb(hours));
}

describe('Lden, Ldn, CNEL', () => {
  const constant = (levelDb: unknown) => ({
    day: Number(levelDb),
    evening: Number(levelDb),
    night: Number(levelDb),
  });

  check('const60-ldn', (example) => expectLevel(ldnDb(constant(example.input)), example));
  check('const60-cnel', (example) => expectLevel(cnelDb(constant(example.input)), example));
  check('const60-lden', (example) => expectLevel(ldenDb(DEFAULT_SCHEME, constant(example.input)), example));
  check('const60-lden-IT', (example) =>
    expectLevel(ldenDb(schemeOf('it'), constant(example.input)), example),
  );
  check('const60-lden-DK-FI', (example) => {
    expectLevel(ldenDb(schemeOf('dk'), constant(example.input)), example);
    expectLevel(ldenDb(schemeOf('fi'), constant(example.input)), example);
  });
  check('ldn-64-50', (example) => {
    const { Lday, Lnight } = example.input as { Lday: number; Lnight: number };
    expectLevel(ldnDb({ day: Lday, night: Lnight }), example);
  });
  check('lden-632', (example) => {
    const { Lday, Levening, Lnight } = example.input as Record<'Lday' | 'Levening' | 'Lnight', number>;
    expectLevel(ldenDb(DEFAULT_SCHEME, { day: Lday, evening: Levening, night: Lnight }), example);
  });
  check('lden-24h-profile', (example) => {
    const hourly = example.input as number[];
    const wanted = example.expect as Record<string, number>;
    const levels = {
      day: hoursMeanDb(hourly, 7, 19),
      evening: hoursMeanDb(hourly, 19, 23),
      night: hoursMeanDb(hourly, 23, 7),
    };
    expectNear(energyMeanDb(hourly), wanted['LAeq24']);
    expectNear(levels.day, wanted['Lday']);
    expectNear(levels.evening, wanted['Levening']);
    expectNear(levels.night, wanted['Lnight']);
    expectLevel(ldenDb(DEFAULT_SCHEME, levels), { ...example, expect: wanted['Lden'] });
    const ldn = ldnDb({ day: hoursMeanDb(hourly, 7, 22), night: hoursMeanDb(hourly, 22, 7) });
    expectNear(ldn, wanted['Ldn_07_22']);
  });
  check('lden-real-valencia', (example) => {
    const { Lday, Levening, Lnight } = example.input as Record<'Lday' | 'Levening' | 'Lnight', number>;
    const wanted = example.expect as { Lden: number; LAeq24: number };
    const published = example.published as { Lden: number; LAeq24: number };
    const lden = ldenDb(DEFAULT_SCHEME, { day: Lday, evening: Levening, night: Lnight });
    const laeq24 = energyMeanDb([Lday, Levening, Lnight], [12, 4, 8]);
    expectNear(lden, wanted.Lden);
    expectNear(laeq24, wanted.LAeq24);
    expectNear(lden, published.Lden, example.tolerance_vs_published_dB);
    expectNear(laeq24, published.LAeq24, example.tolerance_vs_published_dB);
  });
  check('real-days', (example) => {
    type Levels = Record<'Ldn' | 'Lden' | 'Leq', number>;
    const days = example.input as {
      hourly: number[];
      published: Levels & { SEL: number };
      computed: Levels;
    }[];
    expect(days).toHaveLength(6);
    for (const { hourly, published, computed } of days) {
      const night = hoursMeanDb(hourly, 22, 7);
      const ldn = ldnDb({ day: hoursMeanDb(hourly, 7, 22), night });
      const cnel = cnelDb({ day: hoursMeanDb(hourly, 7, 19), evening: hoursMeanDb(hourly, 19, 22), night });
      const leq = energyMeanDb(hourly);
      expectNear(ldn, computed.Ldn, 6e-4);
      expectNear(cnel, computed.Lden, 6e-4);
      expectNear(leq, computed.Leq, 6e-4);
      expectNear(ldn, published.Ldn, 0.02);
      expectNear(cnel, published.Lden, 0.02);
      expectNear(leq, published.Leq, 0.02);
      expectNear(laeDb(leq, 86_400), published.SEL, 0.02);
    }
  });
  check('real-partial-day', (example) => {
    const { hourly, published } = example.input as { hourly: number[]; published: { Leq: number } };
    const wanted = example.expect as { equal_weight_hours: number };
    // Hours weighted equally, whatever they hold: the mistake. It is 1.5 dB off the pooled seconds.
    expectNear(energyMeanDb(hourly), wanted.equal_weight_hours, 1e-3);
    expect(Math.abs(present(energyMeanDb(hourly)) - published.Leq)).toBeGreaterThan(1.4);
  });
  check('lden-real-malaga', (example) => {
    const days = example.input as Record<'Ld' | 'Le' | 'Ln' | 'Lden' | 'computed_Lden', number>[];
    expect(days).toHaveLength(8);
    for (const { Ld, Le, Ln, Lden, computed_Lden } of days) {
      const lden = ldenDb(DEFAULT_SCHEME, { day: Ld, evening: Le, night: Ln });
      expectNear(lden, computed_Lden, 6e-4);
      expectNear(lden, Lden, 0.1);
    }
  });
  check('lden-real-malaga-trap', (example) => {
    const wanted = example.expect as Record<string, number>;
    const { Ln } = example.input as { Ln: string };
    expect(ldenDb(DEFAULT_SCHEME, { day: null, evening: null, night: Number(Ln) })).toBeNull();
    // With its "0.0" for missing taken as a level, a figure would come out.
    const trapped = ldenDb(DEFAULT_SCHEME, { day: 0, evening: 0, night: Number(Ln) });
    expectNear(trapped, wanted['formula with 0.0 taken as a level']);
  });
});

function schemeOf(key: string): PeriodScheme {
  return present(
    NATIONAL_SCHEMES.find((preset) => preset.key === key),
    key,
  ).scheme;
}

describe('national periods (levels.json "periods")', () => {
  const keyOfState: Readonly<Record<string, string>> = {
    'EU default': 'eu',
    Germany: 'de',
    France: 'fr',
    Italy: 'it',
    Spain: 'es',
    Netherlands: 'nl',
    'Denmark (road, rail)': 'dk',
    'Ireland (industry, NG4)': 'ie',
    'UK (END/BS 4142)': 'uk',
    'US DNL': 'us-dnl',
    'California CNEL': 'us-ca',
    Sweden: 'se',
    Austria: 'at',
    Portugal: 'pt',
    Finland: 'fi',
  };
  const statusOf = (status: string) =>
    status === 'verified' ? 'verified' : status.includes('secondary') ? 'secondary' : 'from memory';

  test.each(periods)('$state', (period) => {
    const preset = present(NATIONAL_SCHEMES.find(({ key }) => key === keyOfState[period.state]));
    const { day, evening, night } = nominalHoursOf(preset.scheme);
    expect([day, evening, night]).toEqual(period.hours);
    const startOf = (clock: string | null) => (clock === null ? null : Number(clock.slice(0, 2)) * 60);
    expect(preset.scheme.dayStartMin).toBe(startOf(period.day));
    if (preset.scheme.eveningStartMin !== null)
      expect(preset.scheme.eveningStartMin).toBe(startOf(period.evening));
    expect(preset.scheme.nightStartMin).toBe(startOf(period.night));
    // The UK row mixes two statuses: its Lden hours are from memory.
    if (preset.key !== 'uk') expect(preset.status).toBe(statusOf(period.status));
  });

  test('the UK row: BS 4142 day 07–23 without an evening; its Lden hours are from memory', () => {
    expect(schemeOf('uk-bs4142')).toEqual({ dayStartMin: 420, eveningStartMin: null, nightStartMin: 1380 });
    expect(NATIONAL_SCHEMES.find(({ key }) => key === 'uk')?.status).toBe('from memory');
  });

  test('every preset is a possible scheme, under a key of its own', () => {
    expect(NATIONAL_SCHEMES.map(({ scheme }) => schemeProblem(scheme))).toEqual(
      NATIONAL_SCHEMES.map(() => null),
    );
    expect(new Set(NATIONAL_SCHEMES.map(({ key }) => key)).size).toBe(NATIONAL_SCHEMES.length);
  });
});

describe('exceedance levels', () => {
  check('ln-100', (example) => {
    const { exceedance_inverted_cdf } = example.expect as { exceedance_inverted_cdf: Record<string, number> };
    const counts = countsOf(Array.from({ length: 100 }, (_, i) => [41 + i, 1]));
    for (const [name, levelDb] of Object.entries(exceedance_inverted_cdf)) {
      const percent = Number(name.slice(1));
      expect(counts.exceededTenths(percent), name).toBe(levelDb * 10);
      // 100 samples are enough for L10, L50, L90, and L95 (60), not for L1 (300).
      expect(counts.exceedanceLevelDb(percent, 1), name).toBe(name === 'L1' ? null : levelDb);
    }
    expect(counts.exceedanceLevelDb(10, 1), 'direction swapped').not.toBe(50);
  });
  check('ln-step', (example) => {
    const wanted = example.expect as Record<string, number>;
    const counts = countsOf([...new Array(5).fill([50, 60]), ...new Array(55).fill([40, 60])]);
    for (const percent of [1, 5, 8, 9, 10, 50, 90]) {
      expect(counts.exceededTenths(percent), `L${percent}`).toBe(present(wanted[`L${percent}`]) * 10);
    }
    expectNear(energyMeanDb([50, 40], [5, 55]), wanted['Leq']);
    // Mixed lengths, weighted by duration as always here, give the same level but no L_N to publish.
    const mixed = countsOf([
      [50, 300],
      [40, 3300],
    ]);
    expect(mixed.exceededTenths(10)).toBe(400);
    expect(mixed.exceedanceLevelDb(10, null)).toBeNull();
  });
  check('ln-not-energy', () => {
    // 12 quiet hours and 12 loud ones: the merged distribution, not any mean of the hours' L90.
    const quiet = countsOf(Array.from({ length: 720 }, (_, i) => [40 + (i % 10) / 10, 60]));
    const loud = countsOf(Array.from({ length: 720 }, (_, i) => [60 + (i % 10) / 10, 60]));
    const [quietL90, loudL90] = [quiet.exceedanceLevelDb(90, 60), loud.exceedanceLevelDb(90, 60)].map((l) =>
      present(l),
    );
    quiet.merge(loud);
    const merged = present(quiet.exceedanceLevelDb(90, 60));
    expect(merged).toBe(40.1);
    expect(Math.abs(merged - (present(quietL90) + present(loudL90)) / 2)).toBeGreaterThan(9);
    expect(Math.abs(merged - present(energyMeanDb([present(quietL90), present(loudL90)])))).toBeGreaterThan(
      15,
    );
  });
  check('crtn-l10-18h', (example) => {
    const { L10_18h, reported } = example.expect as { L10_18h: number; reported: number };
    const level = l10of18hDb(example.input as number[]);
    expectLevel(level, { ...example, expect: L10_18h });
    expect(roundHalfUp(present(level), 0)).toBe(reported);
  });
});

test('no example is forgotten: only the shortened L10 (from memory) is not part of the core', () => {
  expect(examples.map(({ id }) => id).filter((id) => !checked.has(id))).toEqual(['crtn-short']);
});
