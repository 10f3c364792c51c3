import { expect, test } from 'vitest';
import { limitMetricText, type LimitMetric } from '#lib/format/limitMetric';
import { wordsOf } from '#lib/services/summaries/document/words/words';

const BASE: LimitMetric = {
  metric: 'LAeq',
  averaging: '1h',
  fromMin: null,
  toMin: null,
  bandFraction: null,
  bandIndex: null,
};
const german = (changes: Partial<LimitMetric>) =>
  wordsOf('de').limitText(limitMetricText({ ...BASE, ...changes }));

test.each<[Partial<LimitMetric>, string]>([
  [{}, 'LAeq,1 h'],
  [{ averaging: 'night' }, 'Lnight'],
  [{ averaging: 'length', windowMin: 30, stepMin: 5 }, 'LAeq,30 min, gleitend um 5 min'],
  [{ metric: 'LAFmax', averaging: '15min' }, 'LAFmax innerhalb von 15 min'],
  [{ metric: 'LAFmax', averaging: 'night' }, 'LAFmax innerhalb der Nacht'],
  [{ metric: 'LAE', averaging: 'day' }, 'LAE innerhalb des Tages'],
  [{ metric: 'LAN', percent: 10 }, 'LA10,1 h'],
  [{ metric: 'Lden', averaging: 'den' }, 'Lden des Datums'],
  [{ metric: 'LCeqLessLAeq' }, 'LCeq − LAeq innerhalb von 1 h'],
  [{ metric: 'LAeqLessLA90', averaging: 'evening' }, 'LAeq − LA90 innerhalb des Abends'],
  [
    { metric: 'LAeqLessLA90', percent: 95, backgroundFromMin: 1380, backgroundToMin: 420 },
    'LAeq,1 h − LA95 der letzten Zeit von 23:00–07:00',
  ],
  [{ metric: 'LAeqLessUsual' }, 'LAeq,1 h über dem Üblichen'],
  [{ metric: 'tonalShare', averaging: '15min' }, 'tonaler Anteil von 15 min, in Prozent'],
  [{ metric: 'tonalShare', averaging: 'day' }, 'tonaler Anteil des Tages, in Prozent'],
  [
    { metric: 'eventCount', averaging: 'night', eventTenths: 655 },
    'Zahl der Ereignisse über LAeq 65,5 dB innerhalb der Nacht',
  ],
  [{ metric: 'eventLAE', eventTenths: 600 }, 'LAE eines Ereignisses über LAeq 60,0 dB innerhalb von 1 h'],
  [{ metric: 'bandLeq', bandFraction: 3, bandIndex: -10 }, 'Leq,1 h der Terz 100 Hz'],
  [{ metric: 'bandLeq', bandFraction: 1, bandIndex: -9 }, 'Leq,1 h der Oktave 125 Hz'],
  [
    { metric: 'bandGroupLeq', bandFraction: 3, bandIndex: -13, bandToIndex: -7 },
    'Leq,1 h der Terzen 50 Hz bis 200 Hz',
  ],
])('%j is named in German', (changes, words) => {
  expect(german(changes)).toBe(words);
});

test('what a limit compares stands in English as the document has it', () => {
  expect(wordsOf('en').limitText(limitMetricText(BASE))).toBe('LAeq,1 h');
});
