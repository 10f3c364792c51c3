import { describe, expect, test } from 'vitest';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { spectrumBlocks } from '#lib/acoustics/spectrumBlocks';

const at = (startSec: number, durationSec: number, ...levels: number[]) => ({
  startSec,
  durationSec,
  levelsCentiDb: Int16Array.from(levels),
});

describe('blocks of at least a minute', () => {
  test('short intervals are averaged by energy and duration', () => {
    const [block, ...others] = spectrumBlocks([at(0, 20, 6000), at(20, 40, 5000)], 60);
    expect(others).toEqual([]);
    expect(block).toMatchObject({ startSec: 0, durationSec: 60 });
    expect(block?.levelsCentiDb[0]).toBe(Math.round(1000 * Math.log10((1e6 * 20 + 1e5 * 40) / 60)));
  });

  test('long intervals stay as they are', () => {
    const minutes = [at(0, 60, 5000), at(60, 60, 6000)];
    expect(spectrumBlocks(minutes, 60)).toEqual(minutes);
  });

  test('a gap drops the part before it, and so does the end', () => {
    const blocks = spectrumBlocks(
      [at(0, 30, 9000), at(40, 30, 5000), at(70, 30, 5000), at(100, 30, 9000)],
      60,
    );
    expect(blocks).toEqual([at(40, 60, 5000)]);
  });

  test('a band that is missing in a part is missing in the block', () => {
    const [block] = spectrumBlocks([at(0, 30, 5000, 4000), at(30, 30, NO_LEVEL_CENTI_DB, 4000)], 60);
    expect([...(block?.levelsCentiDb ?? [])]).toEqual([NO_LEVEL_CENTI_DB, 4000]);
  });
});
