import { pool, type Connection } from './connection';

export type PlantKind = 'fan' | 'pump' | 'compressor' | 'engine' | 'transformer' | 'alarm' | 'other';

/** What is noted about a plant; null = not known or not applicable. */
export interface PlantDetails {
  name: string;
  kind: PlantKind;
  latitude: number | null;
  longitude: number | null;
  minRpm: number | null;
  /** Equal to `minRpm` where the speed is fixed. */
  maxRpm: number | null;
  blades: number | null;
  poles: number | null;
  cylinders: number | null;
  strokes: 2 | 4 | null;
  mainsHz: number | null;
  toneHz: number | null;
  /** Bit 0 is Monday; of the date on which a run begins. */
  weekdays: number;
  /** Local minutes after midnight; both null: all day. An end before the beginning is on the next day. */
  fromMin: number | null;
  toMin: number | null;
  notes: string;
}

/** One version of what is noted about a plant. */
export interface PlantVersionRow extends PlantDetails {
  version: number;
  reason: string;
  createdAt: Date;
  createdByName: string | null;
}

/** A plant with the version that holds now. */
export interface PlantRow extends PlantVersionRow {
  id: number;
  firstNotedAt: Date;
  retiredAt: Date | null;
  retirementReason: string | null;
}

const DETAIL_COLUMNS = {
  name: 'name',
  kind: 'kind',
  latitude: 'latitude',
  longitude: 'longitude',
  minRpm: 'minimum_rpm',
  maxRpm: 'maximum_rpm',
  blades: 'blades',
  poles: 'poles',
  cylinders: 'cylinders',
  strokes: 'strokes',
  mainsHz: 'mains_hz',
  toneHz: 'tone_hz',
  weekdays: 'weekdays',
  fromMin: 'from_min',
  toMin: 'to_min',
  notes: 'notes',
} as const satisfies Record<keyof PlantDetails, string>;

const VERSION_COLUMNS = {
  ...(Object.fromEntries(
    Object.entries(DETAIL_COLUMNS).map(([key, column]) => [key, `plant_versions.${column}`]),
  ) as Record<keyof PlantDetails, string>),
  version: 'plant_versions.version',
  reason: 'plant_versions.reason',
  createdAt: 'plant_versions.created_at',
  createdByName: 'users.name',
};

function selectPlants(conn: Connection) {
  return conn('plants')
    .join('plant_versions', (on) =>
      on.on('plant_versions.plant_id', 'plants.id').andOn('plant_versions.version', 'plants.version'),
    )
    .leftJoin('users', 'users.id', 'plant_versions.created_by')
    .select({
      ...VERSION_COLUMNS,
      id: 'plants.id',
      firstNotedAt: 'plants.created_at',
      retiredAt: 'plants.retired_at',
      retirementReason: 'plants.retirement_reason',
    });
}

/** Plants of a network by name, as they are noted now; retired ones too. */
export async function listPlants(networkId: number, conn: Connection = pool()): Promise<PlantRow[]> {
  return selectPlants(conn).where('plants.network_id', networkId).orderBy('plants.name');
}

export async function findPlant(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<PlantRow | undefined> {
  return selectPlants(conn).where({ 'plants.network_id': networkId, 'plants.id': id }).first();
}

/** Locks a plant of a network until the transaction ends; whoever changes it holds this lock. */
export async function lockPlant(networkId: number, id: number, transaction: Connection): Promise<void> {
  await transaction('plants').where({ network_id: networkId, id }).forUpdate().first('id');
}

/** Every version of a plant, oldest first. */
export async function listPlantVersions(
  plantId: number,
  conn: Connection = pool(),
): Promise<PlantVersionRow[]> {
  return conn('plant_versions')
    .leftJoin('users', 'users.id', 'plant_versions.created_by')
    .where('plant_versions.plant_id', plantId)
    .orderBy('plant_versions.version')
    .select(VERSION_COLUMNS);
}

export interface VersionNote {
  reason: string;
  createdBy: string;
}

/** Adds a plant with its first version and answers its id. A name that is taken fails with MariaDB's duplicate-key error. */
export async function insertPlant(
  networkId: number,
  details: PlantDetails,
  note: VersionNote,
  conn: Connection,
): Promise<number> {
  const [id] = await conn('plants').insert({
    network_id: networkId,
    name: details.name,
    version: 1,
    created_at: new Date(),
  });
  await insertVersion(Number(id), 1, details, note, conn);
  return Number(id);
}

/** Adds a version of a plant, which holds from now on. */
export async function addPlantVersion(
  plantId: number,
  version: number,
  details: PlantDetails,
  note: VersionNote,
  conn: Connection,
): Promise<void> {
  await conn('plants').where({ id: plantId }).update({ name: details.name, version });
  await insertVersion(plantId, version, details, note, conn);
}

async function insertVersion(
  plantId: number,
  version: number,
  details: PlantDetails,
  { reason, createdBy }: VersionNote,
  conn: Connection,
): Promise<void> {
  const keys = Object.keys(DETAIL_COLUMNS) as (keyof PlantDetails)[];
  await conn('plant_versions').insert({
    plant_id: plantId,
    version,
    ...Object.fromEntries(keys.map((key) => [DETAIL_COLUMNS[key], details[key]])),
    reason,
    created_by: createdBy,
    created_at: new Date(),
  });
}

/** Takes a plant out of use (a time) or brings it back (null). */
export async function setPlantRetirement(
  id: number,
  { retiredAt, reason }: { retiredAt: Date | null; reason: string },
  conn: Connection,
): Promise<void> {
  await conn('plants').where({ id }).update({ retired_at: retiredAt, retirement_reason: reason });
}
