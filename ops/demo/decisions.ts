import { inTransaction } from '#db/queries/connection';
import { bandByNominalHz } from '#lib/acoustics/bands';
import { insertLimit } from '#db/queries/limits';
import { insertStationGroup } from '#db/queries/stationGroups';
import { changeEscalation } from '#lib/services/alerts/escalation';
import { addExclusion } from '#lib/services/exclusions/add';
import { excludeAtStations } from '#lib/services/exclusions/bulk';
import { withdraw } from '#lib/services/exclusions/withdraw';
import { DEMO_LIMITS } from './limits';
import { must } from './must';
import type { DemoStation } from './stations';

const HOUR_SEC = 3600;

/** The demo's limits, in force since its history begins, and who is told when nobody acknowledges what passes them. */
export async function seedLimits(
  networkId: number,
  operatorId: string,
  stations: DemoStation[],
  effectiveFromSec: number,
): Promise<void> {
  const idOf = (code: string) => stations.find(({ site }) => site.code === code)?.station.id;
  for (const limit of DEMO_LIMITS) {
    const bandFraction = 'bandFraction' in limit ? limit.bandFraction : null;
    const band = 'bandHz' in limit && bandFraction ? bandByNominalHz(bandFraction, limit.bandHz) : undefined;
    const stationIds = limit.stations.map(idOf).filter((id) => id !== undefined);
    await inTransaction(async (transaction) => {
      const group = 'group' in limit ? { name: limit.group, stationIds, changedBy: operatorId } : null;
      const groupId = group && (await insertStationGroup(networkId, group, transaction));
      await insertLimit(
        networkId,
        {
          effectiveFromSec,
          name: limit.name,
          metric: limit.metric,
          averaging: limit.averaging,
          stepMin: 'stepMin' in limit ? limit.stepMin : null,
          bandFraction,
          bandIndex: band?.index ?? null,
          thresholdTenths: Math.round(limit.thresholdDb * 10),
          weekdays: limit.weekdays.reduce((bits: number, day) => bits | (1 << day), 0),
          fromMin: 'from' in limit ? minutesOf(limit.from) : null,
          toMin: 'to' in limit ? minutesOf(limit.to) : null,
          minimumCoverage: null,
          stationIds,
          groupId,
          recipients: ['operator@merrow.example'],
          reason: limit.reason,
          createdBy: operatorId,
        },
        transaction,
      );
    });
  }
  const who = { networkId, userId: operatorId };
  must(await changeEscalation(who, [{ afterMinutes: 60, people: [operatorId] }]));
}

function minutesOf(clock: string): number {
  return Number(clock.slice(0, 2)) * 60 + Number(clock.slice(3));
}

/** What an operator left out: `hoursAgo` before the demo was made; `withdrawnBecause`: and thought better of it. */
const EXCLUSIONS = [
  { code: 'MER-04', fromHoursAgo: 75, toHoursAgo: 71.5, reason: 'Grass mown right under the mast' },
  { code: 'MER-01', fromHoursAgo: 320, toHoursAgo: 318, reason: 'Painters at the mast, compressor running' },
  {
    code: 'MER-07',
    fromHoursAgo: 500,
    toHoursAgo: 497,
    reason: 'Animals at the microphone: geese on the sea wall',
    withdrawnBecause: 'Geese belong to the marsh: the station is there to hear them, too.',
  },
  { code: 'MER-06', fromHoursAgo: 830, toHoursAgo: 806, reason: 'Street party' },
];

/** A storm that no wind gauge of the network saw in full, left out everywhere by one act. */
const STORM = {
  fromHoursAgo: 634,
  toHoursAgo: 628,
  reason: 'Storm or heavy rain: gusts, warning of the harbour office',
};

export async function seedExclusions(
  networkId: number,
  operatorId: string,
  stations: DemoStation[],
  nowSec: number,
  historyDays: number,
): Promise<void> {
  const at = (hoursAgo: number) => Math.floor((nowSec - hoursAgo * HOUR_SEC) / 60) * 60;
  for (const { code, fromHoursAgo, toHoursAgo, reason, withdrawnBecause } of EXCLUSIONS) {
    if (fromHoursAgo > historyDays * 24) continue;
    const exclusion = await addExclusion({
      networkId,
      stationCode: code,
      fromSec: at(fromHoursAgo),
      toSec: at(toHoursAgo),
      reason,
      userId: operatorId,
    });
    if (!exclusion || !withdrawnBecause) continue;
    await withdraw({ networkId, id: exclusion.id, reason: withdrawnBecause, userId: operatorId });
  }
  const { fromHoursAgo, toHoursAgo, reason } = STORM;
  if (fromHoursAgo > historyDays * 24) return;
  const codes = stations.filter(({ site }) => site.joinedDaysAgo === null).map(({ site }) => site.code);
  const storm = { stations: codes, from: at(fromHoursAgo), to: at(toHoursAgo), reason };
  must(await excludeAtStations({ networkId, userId: operatorId }, storm));
}
