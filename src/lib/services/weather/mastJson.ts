import { type MastAssignment } from '#db/queries/mastAssignments';
import { type MastFacts, type MastRow } from '#db/queries/masts';
import { type StoredWeather } from '#db/queries/weatherRecords';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Assignment, type Mast, type MastFactsInput } from '#lib/contracts/weather';

/** A mast as the interface tells it. */
export function mastJson(
  row: MastRow,
  last: StoredWeather | undefined,
  assignments: readonly MastAssignment[],
): Mast {
  return {
    code: row.code,
    name: row.name,
    latitude: row.latitude,
    longitude: row.longitude,
    height: row.heightM,
    maximumAge: row.maximumAgeSec / 60,
    isRetired: row.retiredAt !== null,
    last: last
      ? {
          start: formatInstantUtc(last.startSec),
          seconds: last.durationSec,
          windSpeed: last.windSpeedMs,
          windDirection: last.windDirectionDeg,
          rain: last.rainMm,
          temperature: last.temperatureC,
        }
      : null,
    assignments: assignments.map(assignmentJson),
  };
}

export function assignmentJson(row: MastAssignment): Assignment {
  return {
    id: row.id,
    mast: row.mastCode,
    station: row.stationCode,
    stationName: row.stationName,
    from: formatInstantUtc(row.fromSec),
    to: row.toSec === null ? null : formatInstantUtc(row.toSec),
    by: row.createdByName,
  };
}

/** What is stored of a mast's facts. */
export function storedFacts({ name, latitude, longitude, height, maximumAge }: MastFactsInput): MastFacts {
  return { name, latitude, longitude, heightM: height, maximumAgeSec: maximumAge * 60 };
}
