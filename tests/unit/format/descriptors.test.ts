import { describe, expect, it } from 'vitest';
import { descriptorParts, descriptorText, typesetRuns } from '#lib/format/descriptors';

describe('descriptors', () => {
  it('sets the averaging time below the line, unbroken', () => {
    expect(descriptorParts('LAeq', '15 min')).toEqual({ symbol: 'L', subscript: 'Aeq,15\u00a0min' });
  });

  it('has a plain form', () => {
    expect(descriptorText('LAeq', '15 min')).toBe('LAeq,15 min');
    expect(descriptorText('Lden')).toBe('Lden');
    expect(descriptorText('LAeq24h')).toBe('LAeq,24 h');
  });

  it('leaves a quantity without subscript alone', () => {
    expect(descriptorParts('NR')).toEqual({ symbol: 'NR', subscript: '' });
  });

  it('finds the descriptors in a sentence and nothing else', () => {
    expect(typesetRuns('LAeq,1 h above 55 dB, Lnight below, L90 and LA10')).toEqual([
      { symbol: 'L', subscript: 'Aeq,1\u00a0h' },
      ' above 55 dB, ',
      { symbol: 'L', subscript: 'night' },
      ' below, ',
      { symbol: 'L', subscript: '90' },
      ' and ',
      { symbol: 'L', subscript: 'A10' },
    ]);
    expect(typesetRuns('Leq,night of the 100 Hz third')).toEqual([
      { symbol: 'L', subscript: 'eq,night' },
      ' of the 100 Hz third',
    ]);
    expect(typesetRuns('Level 90 at London Lane, L100')).toEqual(['Level 90 at London Lane, L100']);
  });
});
