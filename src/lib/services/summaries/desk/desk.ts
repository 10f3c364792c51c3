import { settingsAt, type NetworkRow } from '#db/queries/networks';
import { type SummaryMonth } from '#lib/contracts/summaries';
import { listMonths } from '../listMonths';
import { issuedSinceVisit } from './readers';

const MOST_MONTHS = 24;

/** A network’s latest months as a person sees them among several networks. */
export interface DeskNetwork {
  network: NetworkRow;
  zone: string;
  months: SummaryMonth[];
  /** Months of which something was issued since the person looked at the network’s months last. */
  fresh: ReadonlySet<string>;
}

/** Months of some networks, the latest two years of each. To look here is no visit: what is new stays new until the network’s own page is opened. */
export async function deskOf(
  networks: readonly NetworkRow[],
  userId: string,
  now: Date,
): Promise<DeskNetwork[]> {
  const found: DeskNetwork[] = [];
  for (const network of networks) {
    const [months, settings, issued] = await Promise.all([
      listMonths(network, now),
      settingsAt(network.id, Math.floor(now.getTime() / 1000)),
      issuedSinceVisit({ networkId: network.id, userId }),
    ]);
    found.push({
      network,
      zone: settings.timeZone,
      months: months.slice(0, MOST_MONTHS),
      fresh: new Set(issued.map(({ month }) => month)),
    });
  }
  return found;
}
