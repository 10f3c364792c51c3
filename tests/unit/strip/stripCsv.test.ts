import { expect, it } from 'vitest';
import { stripCsv } from '../../../src/components/strip/model/stripCsv';
import { columnsOf, NINE_THIRDS, withPercentiles } from './columns';

it('writes the columns in view with their bands as they are shown, and gaps without levels', () => {
  const levels = columnsOf([50, null, 52.25, 60], { fromSec: 1_772_323_200, stepSec: 60 });
  const layers = [withPercentiles(levels, [55.3, 51, 48.2])];
  const view = { fromSec: 1_772_323_210, toSec: 1_772_323_380 };
  const weightsCentiDb = NINE_THIRDS.map((_, at) => (at === 0 ? -2250 : 0));
  const text = stripCsv([{ stationCode: 'MER-01', view, layers, weightsCentiDb }], 'A');
  const [head, ...rows] = text.trimEnd().split('\r\n');
  expect(head?.split(',').slice(0, 13)).toEqual([
    'station',
    'start_utc',
    'end_utc',
    'present_s',
    'valid_s',
    'LAeq_dB',
    'LAFmax_dB',
    'LAN_block_s',
    'LA10_dB',
    'LA50_dB',
    'LA90_dB',
    'left_out',
    'LAeq_80Hz_dB',
  ]);
  expect(rows.map((row) => row.split(',').slice(1, 14).join(' '))).toEqual([
    '2026-03-01T00:00:00Z 2026-03-01T00:01:00Z 60 60 50 60 3600 55.3 51 48.2  22.5 45',
    '2026-03-01T00:01:00Z 2026-03-01T00:02:00Z 0 0   3600 55.3 51 48.2   ',
    '2026-03-01T00:02:00Z 2026-03-01T00:03:00Z 60 60 52.3 62.3 3600 55.3 51 48.2  24.8 47.3',
  ]);
});
