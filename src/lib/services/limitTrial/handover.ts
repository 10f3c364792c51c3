import { type LimitTrialAnswer } from '#lib/contracts/limitTrial';
import { Handover } from '../handover';

/** Trials done for pages that come back for them. */
export const doneTrials = new Handover<LimitTrialAnswer>();
