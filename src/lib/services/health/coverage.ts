import { selectQuarterEvidence } from '#db/queries/healthEvidence';
import { listSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type CoverageDay } from '#lib/contracts/health';
import { addDays, datesBetween, type LocalDate } from '#lib/time/zone';
import { dateSettings } from '../levels/datePeriods';

/**
 * What was received and counts of each local date from `fromDate` until before `toDate`: of the seconds that have elapsed of it,
 * however many hours it has.
 */
export async function coverageDays(
  station: Pick<StationRow, 'id' | 'networkId'>,
  fromDate: LocalDate,
  toDate: LocalDate,
  nowSec: number,
): Promise<CoverageDay[]> {
  const timeline = await listSettings(station.networkId);
  const midnightOf = (date: LocalDate) => dateSettings(date, timeline).midnightSec;
  const quarters = await selectQuarterEvidence(station.id, midnightOf(fromDate), midnightOf(toDate));
  let at = 0;
  return datesBetween(fromDate, toDate).map((date): CoverageDay => {
    const [fromSec, toSec] = [midnightOf(date), midnightOf(addDays(date, 1))];
    let [validSeconds, excludedSeconds] = [0, 0];
    for (let quarter = quarters[at]; quarter && quarter.startSec < toSec; quarter = quarters[at]) {
      validSeconds += quarter.validSec;
      excludedSeconds += quarter.excludedSec;
      at += 1;
    }
    const elapsedSeconds = Math.max(0, Math.min(toSec, nowSec) - fromSec);
    const coverage = elapsedSeconds === 0 ? null : Math.min(1, validSeconds / elapsedSeconds);
    return { date, elapsedSeconds, validSeconds, excludedSeconds, coverage };
  });
}
