import { toLngLat, type Point } from './geography/plane';

/** A place of the demo, in degrees (WGS 84). */
export interface Site {
  name: string;
  latitude: number;
  longitude: number;
}

export interface StationSite extends Site {
  code: string;
  /** 3 one-third octaves, 1 octaves. */
  bandFraction: 1 | 3;
  intervalSec: number;
  placement: 'free-field' | 'facade';
  mastHeightM: number;
  surroundings: string;
  /** Days before the demo is made at which the station joined; null: it was there from the start. */
  joinedDaysAgo: number | null;
}

/** Where the stations stand, in metres of the drawing plane. The geography is drawn around these points. */
const STATION_POINTS = {
  'MER-01': [1392, -652],
  'MER-02': [-238, -742],
  'MER-03': [1010, -1452],
  'MER-04': [-1236, -912],
  'MER-05': [330, -2020],
  'MER-06': [-1762, -1338],
  'MER-07': [1080, 1372],
  'MER-08': [-1058, -424],
} as const satisfies Record<string, Point>;

export const SOURCE_POINTS = {
  quayCranes: [760, -600],
  reeferStack: [1180, -810],
  siloFan: [-96, -700],
  railYard: [240, -1500],
  quarry: [60, -2760],
  haulRoad: [290, -2190],
  school: [-1292, -952],
  chapel: [-1822, -1302],
  marsh: [900, 1250],
  ferrySteps: [-1066, -402],
} as const satisfies Record<string, Point>;

function site(name: string, point: Point): Site {
  const [longitude, latitude] = toLngLat(point);
  return { name, latitude, longitude };
}

const thirdsEachMinute = { bandFraction: 3, intervalSec: 60, joinedDaysAgo: null } as const;
const octavesEachMinute = { bandFraction: 1, intervalSec: 60, joinedDaysAgo: null } as const;

/** The eight stations of the Merrow network. */
export const STATION_SITES: StationSite[] = [
  {
    code: 'MER-01',
    ...site('Quay Head', STATION_POINTS['MER-01']),
    ...thirdsEachMinute,
    placement: 'free-field',
    mastHeightM: 6,
    surroundings:
      'East end of Long Quay on open concrete, water on two sides, reefer stack 250 m to the west',
  },
  {
    code: 'MER-02',
    ...site('Silo Lane', STATION_POINTS['MER-02']),
    ...thirdsEachMinute,
    placement: 'facade',
    mastHeightM: 4,
    surroundings: 'Front of a terrace facing the port fence, grain silo 150 m to the east',
  },
  {
    code: 'MER-03',
    ...site('Yard End', STATION_POINTS['MER-03']),
    ...octavesEachMinute,
    placement: 'free-field',
    mastHeightM: 4,
    surroundings: 'East throat of the rail yard, gravel and scrub, a road bridge to the east',
  },
  {
    code: 'MER-04',
    ...site('Ropewalk School', STATION_POINTS['MER-04']),
    ...thirdsEachMinute,
    placement: 'free-field',
    mastHeightM: 4,
    surroundings: 'Edge of the school field on grass, playground 50 m to the south-west, street trees',
  },
  {
    code: 'MER-05',
    ...site('Haul Road', STATION_POINTS['MER-05']),
    ...octavesEachMinute,
    placement: 'free-field',
    mastHeightM: 4,
    surroundings: 'Field edge 30 m east of the quarry haul road, hedges, open pasture behind',
  },
  {
    code: 'MER-06',
    ...site('Chapel Row', STATION_POINTS['MER-06']),
    ...thirdsEachMinute,
    placement: 'facade',
    mastHeightM: 4,
    surroundings: 'Front of a terrace on a quiet street, chapel 70 m to the west, railway to the south',
  },
  {
    code: 'MER-07',
    ...site('Marsh Hide', STATION_POINTS['MER-07']),
    ...thirdsEachMinute,
    placement: 'free-field',
    mastHeightM: 2,
    surroundings: 'Bird hide on the sea wall, saltmarsh and creeks in front, grazing marsh behind',
  },
  {
    code: 'MER-08',
    ...site('Ferry Steps', STATION_POINTS['MER-08']),
    bandFraction: 3,
    intervalSec: 1,
    joinedDaysAgo: 3,
    placement: 'free-field',
    mastHeightM: 4,
    surroundings:
      'Railing above the ferry landing, stone steps and water to the north, cobbled street behind',
  },
];

/** Where a map of the network opens. */
export const MAP_START = { ...site('Merrow estuary', [-180, -640]), zoom: 13 } as const;
