import { findPlant, listPlants, listPlantVersions } from '#db/queries/plants';
import { type Plant, type PlantVersion } from '#lib/contracts/plants';
import { plantJson, plantVersionJson } from './plantJson';

/** Plants of a network by name, as they are noted now; retired ones too. */
export async function plantsOf(networkId: number): Promise<Plant[]> {
  return (await listPlants(networkId)).map(plantJson);
}

/** A plant with every version, oldest first; null when the network has none with this number. */
export async function plantWithVersions(
  networkId: number,
  id: number,
): Promise<{ plant: Plant; versions: PlantVersion[] } | null> {
  const row = await findPlant(networkId, id);
  if (!row) return null;
  return { plant: plantJson(row), versions: (await listPlantVersions(id)).map(plantVersionJson) };
}
