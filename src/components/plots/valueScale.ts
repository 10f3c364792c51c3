/** A range of values with its rules, low to high. */
export interface ValueScale {
  low: number;
  high: number;
  ticks: number[];
}

const MOST_TICKS = 7;

/** A range of round steps that holds some values and zero, at least `least` long. */
export function valueScale(values: readonly number[], least: number): ValueScale {
  const low = Math.min(0, ...values);
  const high = Math.max(0, ...values);
  const missing = Math.max(0, least - (high - low)) / 2;
  const stepped = stepOf((high - low + 2 * missing) / (MOST_TICKS - 1));
  const first = Math.floor((low - missing) / stepped);
  const last = Math.ceil((high + missing) / stepped);
  const ticks = Array.from({ length: last - first + 1 }, (_, at) =>
    Number(((first + at) * stepped).toFixed(6)),
  );
  return { low: first * stepped, high: last * stepped, ticks };
}

/** The smallest of 1, 2, 5 times a power of ten that is at least `raw`. */
function stepOf(raw: number): number {
  const power = 10 ** Math.floor(Math.log10(raw));
  return ([1, 2, 5].find((times) => times * power >= raw * (1 - 1e-9)) ?? 10) * power;
}
