import { describe, expect, test } from 'vitest';
import { bandByNominalHz, bandAt } from '#lib/acoustics/bands';
import {
  adjacentPairTones,
  assessTonality,
  averagedNeighbourTones,
  surveyTones,
  thirdsTenthsOfDb,
  type TonalFinding,
} from '#lib/acoustics/tonality';
import {
  meanAudibilityAdjustmentDb,
  tonalAdjustmentDb,
  tonalAudibilityDb,
} from '#lib/acoustics/tonalityEngineering';
import { lowFrequencyIndicator } from '#lib/acoustics/lowFrequency';
import { aWeightOfBandDb } from '#lib/acoustics/weighting';
import { present, readJson } from './support/fixtures';

interface SurveyExample {
  id: string;
  note: string;
  source: string;
  bands_hz: number[];
  levels_dB: number[];
  iso_both_neighbours: number[];
  arithmetic_average_variant: number[];
}
interface TonalFile {
  engineering_method: {
    source: string;
    examples: {
      example: number;
      Lpt: number;
      Lpn: number;
      fc: number;
      printed_dLta: number;
      computed_dLta: number;
      printed_Kt: number;
      tolerance: number;
    }[];
    table_J1_mean_audibility_to_Kt: Record<string, number | string>;
  };
  examples: SurveyExample[];
}

const file = readJson<TonalFile>('reference/tonal.json');

function bandsOfExample(hz: readonly number[]) {
  return hz.map((nominalHz) => present(bandByNominalHz(3, nominalHz), `band ${nominalHz}`));
}

function spectrumOf({ levels_dB, bands_hz }: SurveyExample) {
  return thirdsTenthsOfDb(levels_dB, bandsOfExample(bands_hz));
}

function nominalHzOf(findings: readonly TonalFinding[]): number[] {
  return findings.map((finding) => bandAt(3, finding.lowerIndex).nominalHz);
}

function example(id: string): SurveyExample {
  return present(
    file.examples.find((candidate) => candidate.id === id),
    id,
  );
}

describe('survey method (ISO 1996-2:2017 Annex K, fixtures/reference/tonal.json)', () => {
  test.each(file.examples)('$id: $note ($source)', (wanted) => {
    expect(nominalHzOf(surveyTones(spectrumOf(wanted)))).toEqual(wanted.iso_both_neighbours);
  });

  test.each(file.examples)('$id against the mean of both neighbours', (wanted) => {
    expect(nominalHzOf(averagedNeighbourTones(spectrumOf(wanted)))).toEqual(
      wanted.arithmetic_average_variant,
    );
  });

  test('A-weighting first hides the 25 Hz tone of a-weighted-trap', () => {
    const trap = example('a-weighted-trap');
    const bands = bandsOfExample(trap.bands_hz);
    const weightedDb = trap.levels_dB.map((levelDb, i) => levelDb + aWeightOfBandDb(present(bands[i]).index));
    expect(surveyTones(thirdsTenthsOfDb(weightedDb, bands))).toEqual([]);
  });

  test('high-float: 32.3 − 27.3 falls short of 5 in floating point, not here', () => {
    expect(32.3 - 27.3 < 5).toBe(true);
    expect(surveyTones(spectrumOf(example('high-float'))).map((f) => f.excessTenths)).toEqual([50]);
  });

  test('plateau: the pair of adjacent bands is found by our own test, and labelled so', () => {
    const findings = adjacentPairTones(spectrumOf(example('plateau')));
    // 60 and 60 dB make 63.0 dB, 18.0 dB over 45 dB on both sides.
    expect(findings).toEqual([
      { method: 'adjacent-pair', lowerIndex: -6, upperIndex: -5, excessTenths: 180, thresholdTenths: 80 },
    ]);
  });

  test('a spectrum of octaves, or averaged too short, is not assessable', () => {
    const { levels_dB, bands_hz } = example('spain-10.5');
    const bands = bandsOfExample(bands_hz);
    expect(assessTonality(1, [60, 75, 60], [bandAt(1, -3), bandAt(1, 0), bandAt(1, 3)], 900)).toEqual({
      kind: 'not-assessable',
      reason: 'octave-bands',
    });
    expect(assessTonality(3, levels_dB, bands, 59).kind).toBe('not-assessable');
    expect(assessTonality(3, levels_dB, bands, 60)).toMatchObject({
      kind: 'assessed',
      findings: [{ method: 'survey', lowerIndex: -6 }],
    });
  });
});

describe('engineering method (ISO 1996-2:2007 Annex C examples C.5, through public tests)', () => {
  test.each(file.engineering_method.examples)('example $example: fc $fc Hz', (wanted) => {
    const audibilityDb = tonalAudibilityDb({ toneDb: wanted.Lpt, noiseDb: wanted.Lpn, centreHz: wanted.fc });
    expect(audibilityDb).toBeCloseTo(wanted.computed_dLta, 3);
    expect(Math.abs(audibilityDb - wanted.printed_dLta)).toBeLessThanOrEqual(wanted.tolerance);
    expect(tonalAdjustmentDb(audibilityDb)).toBe(wanted.printed_Kt);
  });

  test('the adjustment rises from 4 to 10 dB', () => {
    expect([3.9, 4, 7.5, 10, 10.1].map(tonalAdjustmentDb)).toEqual([0, 0, 3.5, 6, 6]);
  });

  test('Table J.1 (ISO 1996-2:2017), both ends of each row', () => {
    const table = file.engineering_method.table_J1_mean_audibility_to_Kt;
    expect(meanAudibilityAdjustmentDb(0)).toBe(table['dL<=0']);
    for (const row of ['0-2', '2-4', '4-6', '6-9', '9-12']) {
      const [aboveDb = NaN, upToDb = NaN] = row.split('-').map(Number);
      expect(meanAudibilityAdjustmentDb(aboveDb + 0.01), row).toBe(table[row]);
      expect(meanAudibilityAdjustmentDb(upToDb), row).toBe(table[row]);
    }
    expect(meanAudibilityAdjustmentDb(12.01)).toBe(table['>12']);
  });
});

describe('low frequency (fixtures/reference/tonal.json "low_frequency_C_minus_A")', () => {
  test('strictly above the bound: 20 dB (DIN 45680:1997), 15 dB (drafts, NSW), 10 dB (WHO 1999)', () => {
    expect(lowFrequencyIndicator(75, 60)?.isAbove).toBe(false);
    expect(lowFrequencyIndicator(75.1, 60)?.isAbove).toBe(true);
    expect(lowFrequencyIndicator(75.1, 60, 20)?.isAbove).toBe(false);
    expect(lowFrequencyIndicator(75.1, 60, 10)?.isAbove).toBe(true);
    expect(lowFrequencyIndicator(null, 60)).toBeNull();
  });
});
