import { listCalibrations } from '#db/queries/calibrations';
import { listDeployments } from '#db/queries/deployments';
import { type Connection } from '#db/queries/connection';
import { type StationRow } from '#db/queries/stations';
import { type Drift } from '#lib/contracts/drift';
import { formatDifferenceDb } from '#lib/format/levels';
import { localDateAt } from '#lib/time/zone';

/** What was done to a station's instrument, in order of time. */
export async function driftMarks(
  station: Pick<StationRow, 'id' | 'networkId'>,
  zone: string,
  conn: Connection,
): Promise<Drift['marks']> {
  const [stays, checks] = await Promise.all([
    listDeployments(station.networkId, conn),
    listCalibrations(station.networkId, null, conn),
  ]);
  const came = stays
    .filter(({ stationId, withdrawnAt }) => stationId === station.id && withdrawnAt === null)
    .map(({ startSec, serialNumber }) => ({
      sec: startSec,
      kind: 'deployment' as const,
      words: `Instrument ${serialNumber} came`,
    }));
  const ofStation = checks.filter(
    ({ stationId, withdrawnAt }) => stationId === station.id && withdrawnAt === null,
  );
  const checked = ofStation.map(({ checkedAtSec, beforeCentiDb, calibratorCentiDb, afterCentiDb }) => {
    const offDb = formatDifferenceDb((beforeCentiDb - calibratorCentiDb) / 100);
    return {
      sec: checkedAtSec,
      kind: afterCentiDb === null ? ('check' as const) : ('adjustment' as const),
      words: `Checked with the calibrator: ${offDb} dB${afterCentiDb === null ? '' : ', then adjusted'}`,
    };
  });
  return [...came, ...checked]
    .sort((a, b) => a.sec - b.sec)
    .map(({ sec, kind, words }) => ({ date: localDateAt(sec, zone), kind, words }));
}
