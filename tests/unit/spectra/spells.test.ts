import { expect, test } from 'vitest';
import { MOST_SPELLS, SpellList } from '#lib/services/spectra/spells';

test('of more spells than are kept the most alike stay, as if all had been sorted; of equals the earliest', () => {
  const list = new SpellList(0);
  const all: { stationId: number; fromSec: number; bestRmsDb: number }[] = [];
  let state = 3;
  for (let at = 0; at < 12_500; at += 1) {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    // Some hundred values: many are equal, at the edge too; a later station begins anew in time.
    const spell = {
      stationId: 1 + Math.floor(at / 6001),
      fromSec: (at % 6001) * 120,
      bestRmsDb: (state % 400) / 100,
    };
    all.push(spell);
    list.add(spell.stationId, spell.fromSec, { minute: 0, rmsDb: spell.bestRmsDb, laeqCentiDb: 5000 });
  }
  all.sort((a, b) => a.bestRmsDb - b.bestRmsDb || a.fromSec - b.fromSec);
  const kept = list.finish();
  expect(list.found).toBe(all.length);
  const told = kept.map(({ fromSec, bestRmsDb }) => ({ fromSec, bestRmsDb }));
  expect(told).toEqual(all.slice(0, MOST_SPELLS).map(({ fromSec, bestRmsDb }) => ({ fromSec, bestRmsDb })));
});
