import type { StationRow } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import { intervalsCsv, NotOneFile } from '#lib/services/intervals/csv';
import { readHeavy } from '#lib/services/reading/readHeavy';
import { asOfHeader } from './asOf';
import type { Period } from './parse';
import { badRequest } from './problem';
import { csv } from './respond';

/** Whether the caller asks for CSV rather than JSON. */
export function wantsCsv(request: Request): boolean {
  return /\btext\/csv\b/i.test(request.headers.get('accept') ?? '');
}

/** A station's intervals of a period as a CSV file. @throws {Problem} 400 for more than one file may hold. */
export async function intervalsCsvResponse(station: StationRow, period: Period): Promise<Response> {
  try {
    const day = (sec: number) => formatInstantUtc(sec).slice(0, 10);
    const { answer, dataAsOf } = await readHeavy(() => intervalsCsv(station, period));
    const fileName = `${station.code}_${day(period.fromSec)}_${day(period.toSec)}.csv`;
    return csv(answer, fileName, asOfHeader(dataAsOf));
  } catch (error) {
    throw error instanceof NotOneFile ? badRequest(error.message) : error;
  }
}
