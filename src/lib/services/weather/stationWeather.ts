import { type Connection } from '#db/queries/connection';
import { selectAssignmentsOf, type MastAssignment } from '#db/queries/mastAssignments';
import { selectWeather } from '#db/queries/weatherRecords';
import { directionDuring, weatherDuring, type WeatherRecord } from '#lib/acoustics/mastWeather';
import { type MastWeather } from '#lib/acoustics/validity';

/** A mast for the time that it is assigned to a station, with its records. */
export interface AssignedMast {
  assignment: MastAssignment;
  /** Ascending, disjoint; those beside the time asked for, too, that may speak of its edges. */
  records: readonly WeatherRecord[];
}

/** What the masts assigned to a station tell of its weather. */
export class StationWeather {
  constructor(readonly masts: readonly AssignedMast[]) {}

  /** Weather of an interval by the mast assigned where it begins; null: unknown. */
  during(startSec: number, durationSec: number): MastWeather | null {
    const mast = this.mastAt(startSec);
    if (!mast) return null;
    const { assignment, records } = mast;
    return weatherDuring(records, startSec, startSec + durationSec, assignment.maximumAgeSec);
  }

  /** Where the wind of an interval comes from by that mast, degrees; null: unknown. */
  directionDuring(startSec: number, durationSec: number): number | null {
    const mast = this.mastAt(startSec);
    if (!mast) return null;
    const { assignment, records } = mast;
    return directionDuring(records, startSec, startSec + durationSec, assignment.maximumAgeSec);
  }

  private mastAt(sec: number): AssignedMast | undefined {
    return this.masts.find(
      ({ assignment }) => assignment.fromSec <= sec && sec < (assignment.toSec ?? Infinity),
    );
  }
}

/** Weather of a station over `fromSec <= t < toSec` by the masts assigned to it; null where none is. */
export async function weatherAtStation(
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  conn: Connection,
): Promise<StationWeather | null> {
  const assignments = await selectAssignmentsOf(stationId, { fromSec, toSec }, conn);
  if (assignments.length === 0) return null;
  const masts: AssignedMast[] = [];
  for (const assignment of assignments) {
    const beginSec = Math.max(fromSec, assignment.fromSec);
    // An interval that begins before the assignment's end may last up to an hour beyond it.
    const endSec = Math.min(toSec, (assignment.toSec ?? Infinity) + 3600);
    const { mastId, maximumAgeSec } = assignment;
    masts.push({ assignment, records: await selectWeather(mastId, beginSec, endSec, maximumAgeSec, conn) });
  }
  return new StationWeather(masts);
}
