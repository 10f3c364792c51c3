import { describe, expect, it } from 'vitest';
import { notAssessableWords, toneWords } from '#lib/format/tones';

const finding = (lowerIndex: number, upperIndex: number, excessTenths: number) => ({
  method: lowerIndex === upperIndex ? ('survey' as const) : ('adjacent-pair' as const),
  lowerIndex,
  upperIndex,
  excessTenths,
  thresholdTenths: 150,
});

describe('a tone in words', () => {
  it('names the band, the excess and the range of frequencies', () => {
    expect(toneWords(finding(-10, -10, 158))).toEqual({
      band: '100 Hz band stands out',
      rest: 'by 15.8 dB: a tone between 89 and 112 Hz',
    });
  });

  it('writes kilohertz where they are', () => {
    expect(toneWords(finding(0, 0, 60)).rest).toBe('by 6.0 dB: a tone between 891 Hz and 1.12 kHz');
    expect(toneWords(finding(5, 5, 60)).rest).toBe('by 6.0 dB: a tone between 2.82 and 3.55 kHz');
  });

  it('names both bands of a pair and says whose test that is', () => {
    const words = toneWords(finding(-10, -9, 92));
    expect(words.band).toBe('100 Hz and 125 Hz bands stand out together');
    expect(words.rest).toMatch(/between 89 and 141 Hz.*Bittern/);
  });

  it('never says that there is no tone where none can be assessed', () => {
    expect(notAssessableWords('octave-bands')).toBe(
      'Tones cannot be assessed here: octave bands are too wide for it.',
    );
  });
});
