import { type Energy } from './energy';
import { MAX_SUM_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';
import { toTenths } from './rounding';

/** Classes that have a place in the tables: all of sums of stored levels. */
const LOWEST_TENTHS = MIN_LEVEL_CENTI_DB / 10;
const HIGHEST_TENTHS = MAX_SUM_CENTI_DB / 10;
/** Where an energy is this near to a class's edge, relatively, the logarithm itself decides: more than the slack of rounding half up (2.3e-11) and the tables' own. */
const EDGE_SLACK = 1e-10;
/** Of a double's upper word: its sign, exponent and as much of its fraction that two edges of classes never share a step (0.034 dB). */
const STEP_SHIFT = 13;

const double = new Float64Array(1);
const words = new Uint32Array(double.buffer);
double[0] = 1;
const UPPER_WORD = words[1] === 0 ? 0 : 1;

/** Energies where the classes begin. */
const EDGES = Float64Array.from(
  { length: HIGHEST_TENTHS - LOWEST_TENTHS + 2 },
  (_, at) => 10 ** ((LOWEST_TENTHS + at - 0.5) / 100),
);
const FIRST_STEP = stepOf(10 ** (MIN_LEVEL_CENTI_DB / 1000));
/** Class of the first energy of each step. */
const CLASSES = Int16Array.from(
  { length: stepOf(10 ** (MAX_SUM_CENTI_DB / 1000)) - FIRST_STEP + 1 },
  (_, at) => byLogarithm(beginningOf(FIRST_STEP + at)),
);

/**
 * The class of 0.1 dB of an energy: its level in tenths of a dB, rounded half up, exactly as `toTenths` of 10 lg. By tables, in a
 * fraction of a logarithm's time: distributions of octaves ask for ten a sample.
 */
export function tenthsOfEnergy(energy: Energy): number {
  const tenths = CLASSES[stepOf(energy) - FIRST_STEP];
  if (tenths === undefined) return byLogarithm(energy);
  const edge = EDGES[tenths + 1 - LOWEST_TENTHS] ?? Infinity;
  if (Math.abs(energy - edge) <= edge * EDGE_SLACK) return byLogarithm(energy);
  return energy < edge ? tenths : tenths + 1;
}

function byLogarithm(energy: Energy): number {
  return toTenths(10 * Math.log10(energy));
}

function stepOf(energy: Energy): number {
  double[0] = energy;
  return (words[UPPER_WORD] ?? 0) >>> STEP_SHIFT;
}

function beginningOf(step: number): Energy {
  words[UPPER_WORD] = step << STEP_SHIFT;
  words[1 - UPPER_WORD] = 0;
  return double[0] ?? NaN;
}
