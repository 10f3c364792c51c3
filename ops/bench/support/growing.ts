import { once } from 'node:events';
import { periodStatistics } from '#lib/services/levels/statistics';
import { addCopies } from './copies';
import { msOf } from './measure';
import { FIRST_SEC, fillMonth, MONTH_SEC, repeatMonth } from './months';
import { withOwnSchema } from './schema';
import { makeNetwork, makeStation } from './station';

/**
 * A database of its own with so many months and stations; tells that it is there, then at every message the milliseconds that
 * the statistics of a station's first month took. Started by `growth.ts`; ends when that lets go of it.
 */
const [months = NaN, stations = NaN] = process.argv.slice(2).map(Number);

await withOwnSchema(
  async () => {
    const station = await makeStation(await makeNetwork(), 'MINUTES', 60);
    await fillMonth(station);
    await repeatMonth(station, months);
    await addCopies(station, stations - 1, 'NEIGHBOUR', months);
    const month = () => periodStatistics({ station, fromSec: FIRST_SEC, toSec: FIRST_SEC + MONTH_SEC });
    process.on('message', () => void msOf(month).then((ms) => process.send?.(ms)));
    process.send?.('ready');
    await once(process, 'disconnect');
  },
  { isTold: false },
);
