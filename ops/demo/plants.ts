import { findNetworkBySlug } from '#db/queries/networks';
import { listUsers } from '#db/queries/users';
import { ESTUARY_ZONE } from '#ingest/monitor/soundscape/clock';
import { unitNoise } from '#ingest/monitor/soundscape/noise';
import { newPlantSchema } from '#lib/contracts/plants';
import { formatInstantUtc } from '#lib/contracts/common';
import { noteFile } from '#lib/services/activities/file';
import { addPlant } from '#lib/services/plants/add';
import { addDays, instantAtSec, localDateAt, weekdayOf } from '#lib/time/zone';
import { toLngLat, type Point } from '#ops/standins/tiles/geography/plane';
import { SOURCE_POINTS } from '#ops/standins/tiles/sites';
import { must } from './must';
import { DEMO_NETWORK } from './people';

const HALF_DAY_SEC = 43_200;
const WEEKDAYS = ['mon', 'tue', 'wed', 'thu', 'fri'];

/** The machines behind the simulated soundscape, as the site would note them. */
const PLANTS = [
  {
    name: 'Grain silo fan',
    kind: 'fan',
    ...placed(SOURCE_POINTS.siloFan),
    minRpm: 1480,
    blades: 4,
    weekdays: WEEKDAYS,
    from: '21:30',
    to: '05:15',
    notes: 'Airs the grain on the nights of working days',
  },
  {
    name: 'Reefer condenser fans',
    kind: 'fan',
    ...placed(SOURCE_POINTS.reeferStack),
    minRpm: 1420,
    maxRpm: 1450,
    blades: 8,
    notes: 'One on each container, as many as are plugged in',
  },
  { name: 'Quay transformer', kind: 'transformer', ...placed(SOURCE_POINTS.quayCranes), mainsHz: 50 },
  {
    name: 'Yard locomotive',
    kind: 'engine',
    ...placed(SOURCE_POINTS.railYard),
    minRpm: 700,
    maxRpm: 900,
    cylinders: 8,
    strokes: 4,
    from: '04:30',
    to: '23:30',
    notes: 'Idles between moves',
  },
  {
    name: 'Quarry dewatering pump',
    kind: 'pump',
    ...placed(SOURCE_POINTS.quarry),
    poles: 4,
    mainsHz: 50,
    blades: 6,
  },
  { name: 'Crane travel alarm', kind: 'alarm', ...placed(SOURCE_POINTS.quayCranes), toneHz: 1250 },
];

/** Adds the demo's plant register and operations log of the last `days` days; answers what was made, in words. */
export async function seedPlants(days: number): Promise<string> {
  const [network, users] = await Promise.all([findNetworkBySlug(DEMO_NETWORK.slug), listUsers()]);
  const operator = users.find(({ email }) => email === 'operator@merrow.example');
  if (!network || !operator) throw new Error('The demo’s network and its operator must be made first.');
  for (const plant of PLANTS) must(await addPlant(network.id, newPlantSchema.parse(plant), operator.id));
  const setting = { networkId: network.id, userId: operator.id, zone: ESTUARY_ZONE };
  const nowSec = Math.floor(Date.now() / 1000);
  const report = must(await noteFile(setting, activitiesFile(nowSec, days)));
  return `${PLANTS.length} plants, ${report.added} entries of the operations log`;
}

function placed(point: Point): { latitude: number; longitude: number } {
  const [longitude, latitude] = toLngLat(point);
  return { latitude, longitude };
}

function activitiesFile(nowSec: number, days: number): string {
  const lines = [...shifts(nowSec, days), ...ships(nowSec, days)].filter(([, , , to]) => to <= nowSec);
  const rows = lines.map(
    ([kind, place, from, to]) => `${kind},${place},${formatInstantUtc(from)},${formatInstantUtc(to)}`,
  );
  return ['kind,place,from,to', ...rows].join('\n');
}

type Line = [kind: string, place: string, fromSec: number, toSec: number];

/** The quarry's shifts: 7 to 17 on working days, 7 to 12 on Saturdays. */
function shifts(nowSec: number, days: number): Line[] {
  const today = localDateAt(nowSec, ESTUARY_ZONE);
  return Array.from({ length: days }, (_, back) => addDays(today, -back)).flatMap((date): Line[] => {
    const weekday = weekdayOf(date);
    if (weekday === 6) return [];
    const at = (hour: number) => instantAtSec(date, hour * 60, ESTUARY_ZONE);
    return [['crusher shift', 'Quarry', at(7), at(weekday === 5 ? 12 : 17)]];
  });
}

/** Ships alongside by the half-day, as the simulated cranes know them (seed 122); adjoining halves are one stay. */
function ships(nowSec: number, days: number): Line[] {
  const stays: Line[] = [];
  const last = Math.floor(nowSec / HALF_DAY_SEC);
  for (let half = last - 2 * days; half < last; half += 1) {
    const fromSec = half * HALF_DAY_SEC;
    const isWorkingDay = weekdayOf(localDateAt(fromSec + HALF_DAY_SEC / 2, ESTUARY_ZONE)) < 5;
    if (unitNoise(122, half) >= (isWorkingDay ? 0.75 : 0.4)) continue;
    const before = stays.at(-1);
    if (before?.[3] === fromSec) before[3] += HALF_DAY_SEC;
    else stays.push(['ship at berth', 'Long Quay', fromSec, fromSec + HALF_DAY_SEC]);
  }
  return stays;
}
