import { listLaterActs, listLaterChanges, type LaterAct } from '#db/queries/summaryLaterActs';
import { type Connection } from '#db/queries/connection';
import { type StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { type FigureChange } from '#lib/contracts/summaryLife';
import { type DataDigest } from '#lib/contracts/summaryManifest';
import { dataSpan } from '../seal/dataDigest';
import { type MonthSpan } from '../monthSpan';
import { type BareChange } from './changedFigures';

const DAY_SEC = 86_400;

const NETWORK_WORDS = {
  limits: 'limits were set, changed or withdrawn',
  settings: 'the network’s settings were changed',
  calibrations: 'calibration checks were noted or withdrawn',
} as const;

export interface ReasonGround {
  networkId: number;
  stations: readonly StationRow[];
  span: MonthSpan;
  /** When the figures that are compared with were made. */
  since: Date;
  sealed: DataDigest;
  data: DataDigest;
  conn: Connection;
}

/** Says why each figure changed: what happened to its station, and, of a day’s figure, to that day, since the month was issued. */
export async function withReasons(
  changes: readonly BareChange[],
  ground: ReasonGround,
): Promise<FigureChange[]> {
  if (changes.length === 0) return [];
  const { networkId, stations, span, since, conn } = ground;
  const whole = { networkId, ...dataSpan(span) };
  const yearSec = Date.parse(`${span.month.slice(0, 4)}-01-01T00:00:00Z`) / 1000 - DAY_SEC;
  const acts = await listLaterActs(whole, since, conn);
  const earlier = await listLaterActs({ networkId, fromSec: yearSec, toSec: whole.fromSec }, since, conn);
  const general = (await listLaterChanges(networkId, since, conn)).map((what) => NETWORK_WORDS[what]);
  const idOf = new Map(stations.map(({ code, id }) => [code, id]));
  return changes.map((change) => {
    const stationId = change.station === null ? null : (idOf.get(change.station) ?? null);
    const isOwn = (act: LaterAct) => stationId === null || act.stationId === stationId;
    const own = [...(isToDate(change) ? earlier : []), ...acts].filter(isOwn);
    const near = own.filter((act) => touches(act, dateOf(change)));
    const why = [...new Set((near.length > 0 ? near : own).map(wordsOf))];
    if (change.station !== null && areMissing(change.station, ground))
      why.push('intervals were taken away or moved');
    const words = why.length > 0 ? why : general;
    return {
      ...change,
      why: words.length > 0 ? [...words] : ['something that the figures rest on was changed'],
    };
  });
}

const isToDate = ({ figure }: BareChange) => figure.startsWith('yearToDate');

/** The civil date that a figure is of; null: of the month. */
function dateOf({ figure }: BareChange): string | null {
  return /^(?:days|hours) (\d{4}-\d{2}-\d{2})/.exec(figure)?.[1] ?? null;
}

/** Whether an act may have changed a date’s figures: its day, or the night that reaches into the next, in any zone. */
function touches({ fromSec, toSec }: LaterAct, date: string | null): boolean {
  if (date === null) return true;
  const midnightSec = Date.parse(`${date}T00:00:00Z`) / 1000;
  return fromSec < midnightSec + 2.5 * DAY_SEC && toSec > midnightSec - DAY_SEC / 2;
}

function areMissing(code: string, { sealed, data }: ReasonGround): boolean {
  const of = (digest: DataDigest) => digest.stations.find((station) => station.code === code)?.intervals ?? 0;
  return of(data) < of(sealed);
}

function wordsOf({ kind, count, fromSec, toSec, reason }: LaterAct): string {
  const span = `${formatInstantUtc(fromSec)} to ${formatInstantUtc(toSec)}`;
  switch (kind) {
    case 'intervals':
      return `${count} ${count === 1 ? 'interval' : 'intervals'} between ${span} came later`;
    case 'exclusion':
      return `${span} was left out: ${reason ?? ''}`;
    case 'withdrawal':
      return `${span} is not left out any more: ${reason ?? ''}`;
    case 'exceedance':
      return `${count} ${count === 1 ? 'exceedance was' : 'exceedances were'} judged or acknowledged`;
  }
}
