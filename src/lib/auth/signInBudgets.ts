import { Throttle } from './throttle';

/** Who tries to sign in, and from where. */
export interface Trying {
  /** The person, or the address typed where it is nobody's. */
  account: string;
  address: string;
  /** The browser's cookie, where it has signed this person in before. */
  ownDevice: string | null;
}

const PAIR_PACE = { free: 5, firstSec: 10, mostSec: 900, forgetSec: 86_400 };
const DEVICE_PACE = { free: 10, firstSec: 10, mostSec: 900, forgetSec: 86_400 };
const ADDRESS_PACE = { free: 60, firstSec: 30, mostSec: 900, forgetSec: 900 };

/**
 * Slows guesses of passwords down, by account and address together and by address alone. Nothing is counted by account alone, so
 * that nobody elsewhere locks the owner out; and a browser that has signed the person in before has a budget of its own, which what
 * others do at the same address leaves alone.
 */
export class SignInBudgets {
  private readonly pairs = new Throttle(PAIR_PACE);
  private readonly devices = new Throttle(DEVICE_PACE);
  private readonly addresses = new Throttle(ADDRESS_PACE);

  /** Counts a try. @returns 0 when it may go on, else the seconds after which the next one may. */
  begin(trying: Trying, nowMs: number): number {
    const budgets = this.budgetsOf(trying);
    const waitSec = Math.max(...budgets.map(([throttle, key]) => throttle.waitSec(key, nowMs)));
    if (waitSec === 0) for (const [throttle, key] of budgets) throttle.count(key, nowMs);
    return waitSec;
  }

  /** The try was right: it counts for nothing, and the person begins anew. The address keeps its other tries. */
  succeed(trying: Trying, nowMs: number): void {
    for (const [throttle, key] of this.budgetsOf(trying)) {
      if (throttle === this.addresses) throttle.takeBack(key, nowMs);
      else throttle.forget(key);
    }
  }

  private budgetsOf({ account, address, ownDevice }: Trying): [Throttle, string][] {
    if (ownDevice !== null) return [[this.devices, `${account} ${ownDevice}`]];
    return [
      [this.pairs, `${account} ${address}`],
      [this.addresses, address],
    ];
  }
}
