import { parseArgs } from 'node:util';

export interface SoakOptions {
  /** Minutes of the clock over which the disturbed run's posts are spread. */
  minutes: number;
  stations: number;
  seed: number;
  /** Minutes of data a minute of the clock. */
  speed: number;
  /** Keeps the directory with the database and the logs. */
  keep: boolean;
}

/** Reads `--minutes 10 --stations 1000 --seed 1 --speed 6 --keep`. @throws with what is wrong. */
export function readOptions(args: string[]): SoakOptions {
  const { values } = parseArgs({
    args,
    options: {
      minutes: { type: 'string', default: '10' },
      stations: { type: 'string', default: '1000' },
      seed: { type: 'string', default: '1' },
      speed: { type: 'string', default: '6' },
      keep: { type: 'boolean', default: false },
    },
  });
  const number = (name: 'minutes' | 'stations' | 'seed' | 'speed', lowest: number, highest: number) => {
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
    keep: values.keep,
  };
}
