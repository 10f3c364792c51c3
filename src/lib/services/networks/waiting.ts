import { countOpenComplaints, countOpenExceedances, countOpenQuarantine } from '#db/queries/waiting';
import { doubtsOf } from '../calibrations/doubts';

/** Counting ends here: beyond, nobody reads the number. */
const MOST_COUNTED = 100;

/**
 * What waits for a person in a network: exceedances not yet acknowledged, complaints not yet answered; for operators also refused
 * records not yet settled, and doubtful data that can be decided on.
 */
export interface Waiting {
  exceedances: number;
  complaints: number;
  quarantine: number;
  instruments: number;
}

/** Counts what waits. `isOperator`: also what only operators can settle, which is 0 for others. */
export async function countWaiting(networkId: number, isOperator: boolean): Promise<Waiting> {
  const [exceedances, complaints, quarantine, instruments] = await Promise.all([
    countOpenExceedances(networkId),
    countOpenComplaints(networkId),
    isOperator ? countOpenQuarantine(networkId, MOST_COUNTED) : 0,
    isOperator ? countUndecided(networkId) : 0,
  ]);
  return { exceedances, complaints, quarantine, instruments };
}

/** Doubtful stretches that have ended and that nobody has decided on. */
async function countUndecided(networkId: number): Promise<number> {
  const doubts = await doubtsOf(networkId);
  return doubts.filter(({ decision, toSec }) => decision === null && toSec !== null).length;
}
