import { pool, type Connection } from './connection';

export type PlantVerdict = 'confirmed' | 'rejected';

/** What a person said about a plant as the source of what a station measured in a period (half-open, epoch seconds). */
export interface NewPlantFinding {
  networkId: number;
  stationId: number;
  fromSec: number;
  toSec: number;
  plantId: number;
  /** The version of the plant's notes that it was judged by. */
  plantVersion: number;
  verdict: PlantVerdict;
  /** The words that named the plant; empty where nothing did. */
  namedBecause: string;
  note: string;
  decidedBy: string;
}

export interface PlantFindingRow extends NewPlantFinding {
  id: number;
  plantName: string;
  decidedByName: string | null;
  decidedAt: Date;
}

export async function insertPlantFinding(finding: NewPlantFinding, conn: Connection): Promise<number> {
  const [id] = await conn('plant_findings').insert({
    network_id: finding.networkId,
    station_id: finding.stationId,
    starts_at: finding.fromSec,
    ends_at: finding.toSec,
    plant_id: finding.plantId,
    plant_version: finding.plantVersion,
    verdict: finding.verdict,
    named_because: finding.namedBecause,
    note: finding.note,
    decided_by: finding.decidedBy,
    decided_at: new Date(),
  });
  return Number(id);
}

/** Every finding about periods of a station that overlap `fromSec <= t < toSec`, latest first. */
export async function listPlantFindings(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection = pool(),
): Promise<PlantFindingRow[]> {
  return conn('plant_findings')
    .join('plants', 'plants.id', 'plant_findings.plant_id')
    .leftJoin('users', 'users.id', 'plant_findings.decided_by')
    .where('plant_findings.station_id', stationId)
    .where('plant_findings.starts_at', '<', toSec)
    .where('plant_findings.ends_at', '>', fromSec)
    .orderBy('plant_findings.id', 'desc')
    .select({
      id: 'plant_findings.id',
      networkId: 'plant_findings.network_id',
      stationId: 'plant_findings.station_id',
      fromSec: 'plant_findings.starts_at',
      toSec: 'plant_findings.ends_at',
      plantId: 'plant_findings.plant_id',
      plantName: 'plants.name',
      plantVersion: 'plant_findings.plant_version',
      verdict: 'plant_findings.verdict',
      namedBecause: 'plant_findings.named_because',
      note: 'plant_findings.note',
      decidedBy: 'plant_findings.decided_by',
      decidedByName: 'users.name',
      decidedAt: 'plant_findings.decided_at',
    });
}
