import { type PlantFindingRow } from '#db/queries/plantFindings';
import { type PlantDetails, type PlantRow, type PlantVersionRow } from '#db/queries/plants';
import { formatClockTime, formatInstantUtc } from '#lib/contracts/common';
import { WEEKDAYS } from '#lib/contracts/limits';
import { type PlantFinding } from '#lib/contracts/plantCandidates';
import { type NewPlant, type Plant, type PlantVersion } from '#lib/contracts/plants';

/** What is noted about a plant, as it is stored. Without a highest speed the speed is fixed. */
export function plantDetails(input: NewPlant): PlantDetails {
  const { weekdays, from, to, maxRpm, ...same } = input;
  return {
    ...same,
    maxRpm: maxRpm ?? input.minRpm,
    weekdays: weekdays.reduce((bits, day) => bits | (1 << WEEKDAYS.indexOf(day)), 0),
    fromMin: from,
    toMin: to,
  };
}

/** A version of a plant as the interface gives it. */
export function plantVersionJson(row: PlantVersionRow): PlantVersion {
  return {
    version: row.version,
    name: row.name,
    kind: row.kind,
    latitude: row.latitude,
    longitude: row.longitude,
    minRpm: row.minRpm,
    maxRpm: row.maxRpm,
    blades: row.blades,
    poles: row.poles,
    cylinders: row.cylinders,
    strokes: row.strokes,
    mainsHz: row.mainsHz,
    toneHz: row.toneHz,
    weekdays: WEEKDAYS.filter((_, bit) => (row.weekdays & (1 << bit)) !== 0),
    from: row.fromMin === null ? null : formatClockTime(row.fromMin),
    to: row.toMin === null ? null : formatClockTime(row.toMin),
    notes: row.notes,
    reason: row.reason,
    changedAt: row.createdAt.toISOString(),
    changedBy: row.createdByName,
  };
}

/** A plant as the interface gives it. */
export function plantJson(row: PlantRow): Plant {
  return {
    id: row.id,
    ...plantVersionJson(row),
    createdAt: row.firstNotedAt.toISOString(),
    retirement: row.retiredAt && { at: row.retiredAt.toISOString(), reason: row.retirementReason ?? '' },
  };
}

/** A finding as the interface gives it. */
export function plantFindingJson(row: PlantFindingRow): PlantFinding {
  return {
    plant: row.plantId,
    plantName: row.plantName,
    plantVersion: row.plantVersion,
    from: formatInstantUtc(row.fromSec),
    to: formatInstantUtc(row.toSec),
    verdict: row.verdict,
    namedBecause: row.namedBecause,
    note: row.note,
    decidedAt: row.decidedAt.toISOString(),
    decidedBy: row.decidedByName,
  };
}
