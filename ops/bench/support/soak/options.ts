import { parseArgs } from 'node:util';

export interface SoakOptions {
  /** Minutes of the clock over which the disturbed run's posts are spread. */
  minutes: number;
  stations: number;
  seed: number;
  /** Minutes of data a minute of the clock. */
  speed: number;
  /** Longest time between two kills, in seconds. */
  killsWithin: number;
  /** Minutes in each file that is brought. */
  cardRows: number;
  /** Two webs and two workers. */
  paired: boolean;
  /** Keeps the directory with the database and the logs. */
  keep: boolean;
}

/** Reads `--minutes 10 --stations 1000 --seed 1 --speed 6 --kills-within 12 --card-rows 6000 --paired --keep`. @throws with what is wrong. */
export function readOptions(args: string[]): SoakOptions {
  const { values } = parseArgs({
    args,
    options: {
      minutes: { type: 'string', default: '10' },
      stations: { type: 'string', default: '1000' },
      seed: { type: 'string', default: '1' },
      speed: { type: 'string', default: '6' },
      'kills-within': { type: 'string', default: '12' },
      'card-rows': { type: 'string', default: '6000' },
      paired: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  });
  type Named = 'minutes' | 'stations' | 'seed' | 'speed' | 'kills-within' | 'card-rows';
  const number = (name: Named, lowest: number, highest: number) => {
    const value = Number(values[name]);
    if (!(value >= lowest && value <= highest)) {
      throw new Error(`--${name} must be a number from ${lowest} to ${highest}.`);
    }
    return value;
  };
  return {
    minutes: number('minutes', 0.2, 240),
    stations: Math.round(number('stations', 1, 20_000)),
    seed: Math.round(number('seed', 0, 2 ** 31)),
    speed: number('speed', 0.1, 1000),
    killsWithin: number('kills-within', 2, 600),
    cardRows: Math.round(number('card-rows', 10, 100_000)),
    paired: values.paired,
    keep: values.keep,
  };
}
