import { formatInstantUtc } from '#lib/contracts/common';
import { EXCEEDANCE_STATES, type ExceedanceState } from '#lib/contracts/exceedances';
import { readUrlPeriod, urlInstant } from '#lib/time/urlPeriod';

/** What the list of exceedances is narrowed to, as its address says; null: to nothing. */
export interface ListView {
  period: { fromSec: number; toSec: number } | null;
  /** Code. */
  station: string | null;
  limitId: number | null;
  state: ExceedanceState | null;
  acknowledged: 'yes' | 'no' | null;
}

/** Reads the address; words that mean nothing are as if left out. */
export function readListView(url: URL, zone: string, nowSec: number): ListView {
  const query = url.searchParams;
  const limit = query.get('limit') ?? '';
  const acknowledged = query.get('acknowledged');
  return {
    period: query.get('from') || query.get('to') ? readUrlPeriod(url, zone, nowSec) : null,
    station: query.get('station') || null,
    limitId: /^\d{1,9}$/.test(limit) ? Number(limit) : null,
    state: EXCEEDANCE_STATES.find((known) => known === query.get('state')) ?? null,
    acknowledged: acknowledged === 'yes' || acknowledged === 'no' ? acknowledged : null,
  };
}

/** A view as the list's service takes it; a station that is not among `stations` narrows nothing. */
export function filterOf(view: ListView, stations: readonly { id: number; code: string }[]) {
  const station = stations.find(({ code }) => code === view.station);
  return {
    ...(view.period && { fromSec: view.period.fromSec, toSec: view.period.toSec }),
    ...(station && { stationId: station.id }),
    ...(view.limitId !== null && { limitId: view.limitId }),
    ...(view.state && { state: view.state }),
    ...(view.acknowledged && { isAcknowledged: view.acknowledged === 'yes' }),
  };
}

/** The query of an address for a view, with its question mark; empty for the whole list. */
export function listQuery(view: ListView, zone: string, cursor?: string): string {
  const { period } = view;
  return queryOf([
    ['from', period && urlInstant(period.fromSec, zone)],
    ['to', period && urlInstant(period.toSec, zone)],
    ['station', view.station],
    ['limit', view.limitId],
    ['state', view.state],
    ['acknowledged', view.acknowledged],
    ['cursor', cursor],
  ]);
}

/** The same view as the interface's query. */
export function interfaceQuery(view: ListView): string {
  const { period } = view;
  return queryOf([
    ['from', period && formatInstantUtc(period.fromSec)],
    ['to', period && formatInstantUtc(period.toSec)],
    ['station', view.station],
    ['limitId', view.limitId],
    ['state', view.state],
    ['acknowledged', view.acknowledged],
  ]);
}

function queryOf(pairs: [name: string, value: string | number | null | undefined][]): string {
  const given = pairs.flatMap(([name, value]) =>
    value === null || value === undefined ? [] : [[name, String(value)]],
  );
  const text = new URLSearchParams(given).toString().replaceAll('%3A', ':');
  return text && `?${text}`;
}
