import { expect, it } from 'vitest';
import { stripCsv } from '../../../src/components/strip/model/stripCsv';
import { columnsOf, NINE_THIRDS } from './columns';

it('writes the columns in view with their bands as they are shown, and gaps without levels', () => {
  const layers = [columnsOf([50, null, 52.25, 60], { fromSec: 1_772_323_200, stepSec: 60 })];
  const view = { fromSec: 1_772_323_210, toSec: 1_772_323_380 };
  const weightsCentiDb = NINE_THIRDS.map((_, at) => (at === 0 ? -2250 : 0));
  const text = stripCsv([{ stationCode: 'MER-01', view, layers, weightsCentiDb }], 'A');
  const [head, ...rows] = text.trimEnd().split('\r\n');
  expect(head?.split(',').slice(0, 9)).toEqual([
    'station',
    'start_utc',
    'end_utc',
    'present_s',
    'valid_s',
    'LAeq_dB',
    'LAFmax_dB',
    'left_out',
    'LAeq_80Hz_dB',
  ]);
  expect(rows.map((row) => row.split(',').slice(1, 10).join(' '))).toEqual([
    '2026-03-01T00:00:00Z 2026-03-01T00:01:00Z 60 60 50 60  22.5 45',
    '2026-03-01T00:01:00Z 2026-03-01T00:02:00Z 0 0     ',
    '2026-03-01T00:02:00Z 2026-03-01T00:03:00Z 60 60 52.3 62.3  24.8 47.3',
  ]);
});
