import { type Connection } from '#db/queries/connection';
import { type ExceedanceRow } from '#db/queries/exceedances';
import { listHolidays } from '#db/queries/holidays';
import { listLimitRecords, type LimitRecord } from '#db/queries/limits';
import { type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { documentLimitSchema, type DocumentLimit } from '#lib/contracts/monthDocument';
import { type Compliance } from '#lib/contracts/monthEvidence';
import { limitMetricText, limitUnit } from '#lib/format/limitMetric';
import { partsOf } from '../../limitTrial/parts';
import { tryRule } from '../../limitTrial/tryRule';
import { byLimit, coversStation, replacedFromSec } from '../../limits/force';
import { limitView } from '../../limits/view';
import { type Span } from '../../levels/spans';

/** A version of a limit with the part of the month in which it is in force. */
export interface LimitInForce {
  version: LimitRecord;
  view: DocumentLimit;
  span: Span;
  /** Windows by station id; null: this quantity’s windows are not counted. */
  windows: ReadonlyMap<number, NonNullable<Compliance['windows']>> | null;
}

export interface LimitGround {
  networkId: number;
  stations: readonly StationRow[];
  timeline: NetworkSettings[];
  month: Span;
  nowSec: number;
  conn: Connection;
}

/** Versions of limits in force at some time of a month, with how many of their windows could be compared. */
export async function limitsInForce(ground: LimitGround): Promise<LimitInForce[]> {
  const { networkId, stations, month, nowSec, conn } = ground;
  const codes = new Map(stations.map(({ id, code }) => [id, code]));
  const holidayDates = new Set((await listHolidays(networkId, conn)).map(({ date }) => date));
  const found: LimitInForce[] = [];
  for (const [limitId, ofLimit] of byLimit(await listLimitRecords(networkId, null, conn))) {
    const { versions } = limitView(ofLimit, { seesRecipients: false, codes, nowSec });
    for (const version of ofLimit) {
      const view = versions.find((one) => one.version === version.version);
      const span = inForceWithin(version, ofLimit, month);
      if (!view || !span) continue;
      const windows = isCounted(version) ? await windowsOf(version, span, ground, holidayDates) : null;
      found.push({ version, view: documentLimitSchema.parse({ ...view, id: limitId }), span, windows });
    }
  }
  return found;
}

/** How a station stands to the limits that hold for it. */
export function complianceOf(
  station: StationRow,
  limits: readonly LimitInForce[],
  exceedances: readonly ExceedanceRow[],
  meetsMinimum: boolean,
): Compliance[] {
  return limits
    .filter(({ version }) => coversStation(version, station.id))
    .map(({ version, windows }) => {
      const own = exceedances.filter(({ limitVersionId }) => limitVersionId === version.id);
      const standing = own.filter(({ state }) => state === 'standing');
      const counted = windows?.get(station.id) ?? null;
      const isCompared = counted ? counted.compared > 0 : meetsMinimum;
      return {
        limitId: version.limitId,
        limitVersion: version.version,
        limit: version.name,
        metric: limitMetricText(version),
        threshold: version.thresholdTenths / 10,
        unit: limitUnit(version.metric),
        windows: counted,
        standing: standing.length,
        lifted: own.length - standing.length,
        highest: standing.length === 0 ? null : Math.max(...standing.map(({ levelDb }) => levelDb)),
        state: standing.length > 0 ? 'exceeded' : isCompared ? 'not-exceeded' : 'not-compared',
      };
    });
}

function inForceWithin(version: LimitRecord, ofLimit: readonly LimitRecord[], month: Span): Span | null {
  const withdrawnSec = version.withdrawnAt ? Math.floor(version.withdrawnAt.getTime() / 1000) : Infinity;
  const fromSec = Math.max(month.fromSec, version.effectiveFromSec);
  const toSec = Math.min(month.toSec, replacedFromSec(version, ofLimit), withdrawnSec);
  return fromSec < toSec ? { fromSec, toSec } : null;
}

/** Windows whose count would take reading every interval, or weeks before, are not counted. */
function isCounted(version: LimitRecord): boolean {
  const { averaging, windowMin, stepMin, fromMin, toMin } = version;
  const isRagged = averaging === 'hours' && [fromMin, toMin].some((minute) => (minute ?? 0) % 15 !== 0);
  const isFine = (windowMin ?? 0) % 15 !== 0 || (stepMin !== null && stepMin % 15 !== 0) || isRagged;
  const parts = partsOf(version);
  return !isFine && parts !== null && (stepMin === null || parts === 'energies');
}

async function windowsOf(
  version: LimitRecord,
  period: Span,
  { stations, timeline, nowSec, conn }: LimitGround,
  holidayDates: ReadonlySet<string>,
): Promise<Map<number, NonNullable<Compliance['windows']>>> {
  const tried = await tryRule(version, { stations, timeline, holidayDates, period, nowSec }, conn);
  return new Map(
    tried.map(({ station, counts }) => [station.id, { ended: counts.windows, compared: counts.compared }]),
  );
}
