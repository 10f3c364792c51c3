/**
 * How likely two counts over equal times differ at least this much by chance alone, if the events are independent and their rate stayed
 * the same: two-sided, exact (given their sum, the one count is binomial with one half; Przyborowski and Wilenski 1940). 1 for no events.
 */
export function chanceOfDifference(before: number, after: number): number {
  const sum = before + after;
  const smaller = Math.min(before, after);
  // Terms of the tail from the smallest on, in logarithms: factorials of hundreds do not fit.
  let logTerm = -sum * Math.LN2;
  let tail = Math.exp(logTerm);
  for (let k = 1; k <= smaller; k += 1) {
    logTerm += Math.log((sum - k + 1) / k);
    tail += Math.exp(logTerm);
  }
  return Math.min(1, 2 * tail);
}
