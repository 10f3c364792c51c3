import { listOpenTroubles } from '#db/queries/health';
import { listStations } from '#db/queries/stations';
import { type TroubleKind } from '#lib/contracts/health';
import { type StationListChoice } from '#lib/contracts/stationList';
import { type Station, type StationState } from '#lib/contracts/stations';
import { groupBy } from '../groupBy';
import { kindOf } from '../health/troubleJson';
import { type Span } from '../levels/spans';
import { stationsOf } from './list';
import { compareStations } from './listOrder';
import { type StationListRow } from './listRow';
import { stationFigures } from './stationFigures';

export interface StationList {
  /** The stations chosen, in the order asked for. */
  rows: StationListRow[];
  /** How many of all of the network's stations are in each state. */
  counts: Record<StationState, number>;
}

/** The stations of a network that a choice leaves, with the figures of a period. */
export async function stationList(
  networkId: number,
  period: Span,
  choice: StationListChoice,
): Promise<StationList> {
  const [records, stations, open] = await Promise.all([
    listStations(networkId),
    stationsOf(networkId),
    listOpenTroubles(networkId),
  ]);
  const byCode = new Map(records.map((record) => [record.code, record]));
  const troubles = groupBy(open, ({ stationId }) => stationId);
  const chosen = stations.flatMap((station) => {
    const record = byCode.get(station.code);
    if (!record) return [];
    const row = { station, record, troubles: (troubles.get(record.id) ?? []).map(kindOf) };
    return isChosen(row, choice) ? [row] : [];
  });
  const rows = await Promise.all(
    chosen.map(async ({ record, ...row }) => ({ ...row, figures: await stationFigures(record, period) })),
  );
  return { rows: rows.sort(compareStations(choice.sort)), counts: countStates(stations) };
}

function isChosen(
  { station, troubles }: Pick<StationListRow, 'station' | 'troubles'>,
  { text, state, health }: StationListChoice,
): boolean {
  const isInState =
    state === 'all' || (state === 'in-use' ? station.state !== 'retired' : station.state === state);
  return isInState && isOfHealth(troubles, health) && hasText(station, text);
}

function isOfHealth(troubles: readonly TroubleKind[], health: StationListChoice['health']): boolean {
  if (health === 'any') return true;
  if (health === 'trouble') return troubles.length > 0;
  return health === 'fine' ? troubles.length === 0 : troubles.includes(health);
}

function hasText({ name, code, surroundings }: Station, text: string): boolean {
  return `${code} ${name} ${code} ${surroundings}`.toLowerCase().includes(text.toLowerCase());
}

function countStates(stations: readonly Station[]): StationList['counts'] {
  const counts = { live: 0, silent: 0, awaiting: 0, retired: 0 };
  for (const { state } of stations) counts[state] += 1;
  return counts;
}
