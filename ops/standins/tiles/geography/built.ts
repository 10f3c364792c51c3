import { buildAlong, buildBehind, type Building } from './frontages';
import { area, line, type MapFeature } from './feature';
import { BuildingGround } from './ground';
import { landmarks } from './landmarks';
import { railWays } from './railway';
import { mainRoads, ROAD_MINZOOM, ROAD_WIDTH_M, type Road } from './roads';
import { box } from './shapes';
import { townStreets, villageStreets, type FrontageName, type Street } from './townStreets';
import { parcels } from './fields';
import { treeFeatures } from './trees';
import { zones } from './zones';

const streets: Street[] = [...townStreets, ...villageStreets];

const MARKET_PLACE = box(-884, -628, -818, -572);

/** Country roads that farms stand along, and the roads through the town that are built up. */
const FRONTAGE_OF_ROAD: Partial<Record<string, FrontageName>> = {
  'High Street': 'shops',
  'Dock Road': 'oldTown',
  'Merrow Road': 'villas',
};

function frontageOf({ name, kind }: Road): FrontageName {
  const isCountry = kind === 'lane' || kind === 'tertiary' || kind === 'secondary';
  return FRONTAGE_OF_ROAD[name] ?? (isCountry ? 'farms' : 'none');
}

function openGround(): BuildingGround {
  const ground = new BuildingGround([
    ...zones.filter(({ isReserved }) => isReserved).map(({ ring }) => ring),
    ...landmarks.map(({ ring }) => ring),
    MARKET_PLACE,
    ...parcels.filter(({ use }) => use === 'wood').map(({ ring }) => ring),
  ]);
  for (const { points, kind } of [...mainRoads, ...streets]) ground.addWay(points, ROAD_WIDTH_M[kind]);
  for (const points of railWays) ground.addWay(points, 26);
  return ground;
}

/** Houses along the town's streets first, then what stands behind them, farms where room is left, trees last. */
function grown(): { buildings: Building[]; trees: MapFeature[] } {
  const ground = openGround();
  const alongRoads = mainRoads.map((road): Street => ({ ...road, frontage: frontageOf(road) }));
  const inTown = [...alongRoads.filter(({ frontage }) => frontage !== 'farms'), ...streets];
  const farms = alongRoads.filter(({ frontage }) => frontage === 'farms');
  const buildings = [
    ...[...inTown, ...farms].flatMap((street, index) => buildAlong(street, ground, 5000 + index * 37)),
    ...inTown.flatMap((street, index) => buildBehind(street, ground, 9000 + index * 37)),
  ];
  return { buildings, trees: treeFeatures(ground) };
}

/** Roads, streets, and what stands along them. */
export function builtFeatures(): MapFeature[] {
  const { buildings, trees } = grown();
  return [
    ...zones.map(({ kind, name, ring }) =>
      area('landuse', { minzoom: kind === 'residential' || kind === 'port' ? 8 : 11 }, [ring], {
        class: kind,
        ...(name === undefined ? {} : { name }),
      }),
    ),
    area('landuse', { minzoom: 14 }, [MARKET_PLACE], { class: 'square', name: 'Market Place' }),
    ...[...streets, ...mainRoads].map(({ kind, name, points }) =>
      line('roads', { minzoom: ROAD_MINZOOM[kind] }, points, { class: kind, name }),
    ),
    ...trees,
    ...buildings.map(({ ring, kind }) =>
      area('buildings', { minzoom: kind === 'outhouse' ? 16 : 14 }, [ring], { class: kind }),
    ),
    ...landmarks.map(({ ring, kind, name }) =>
      area('buildings', { minzoom: 13 }, [ring], { class: kind, ...(name === undefined ? {} : { name }) }),
    ),
  ];
}
