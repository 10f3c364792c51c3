import { type LimitTrialAnswer, type LimitTrialQuery } from '#lib/contracts/limitTrial';
import { type Outcome } from '../outcome';

/** A limit to be tried; passes between threads. */
export interface TrialTask {
  networkId: number;
  query: LimitTrialQuery;
  /** Windows that end later have not closed. */
  nowSec: number;
}

export type TrialOutcome = Outcome<LimitTrialAnswer>;
