import { beforeAll, describe, expect, test } from 'vitest';
import { insertComplaint } from '#db/queries/complaints';
import { inTransaction } from '#db/queries/connection';
import { insertLimit, listLimitVersions } from '#db/queries/limits';
import { listSettings } from '#db/queries/networks';
import { findStation, type StationRow } from '#db/queries/stations';
import { applyingLimits } from '#lib/services/complaints/applyingLimits';
import { changeHolidays } from '#lib/services/holidays/holidays';
import { windowsOf } from '#lib/services/limits/windows';
import { networkClocks } from '#lib/services/strip/clocks';
import { stripTrack } from '#lib/services/strip/track';
import { timesOfValidity } from '../../../src/components/strip/model/limitLines';
import { joinRuns } from '../../../src/components/strip/model/runs';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const at = (text: string) => Date.parse(text) / 1000;
/** A Wednesday that is a named date, and the Thursday after it. */
const HOLIDAY = '2026-11-18';
const period = { fromSec: at('2026-11-17T00:00:00Z'), toSec: at('2026-11-20T00:00:00Z') };
let networkId: number;
let station: StationRow;

beforeAll(async () => {
  networkId = await makeNetwork('track');
  const { userId } = await makePerson(networkId, ['operator']);
  const stationId = await makeStation(networkId, 'TR-1');
  const otherId = await makeStation(networkId, 'TR-2');
  await changeHolidays({ networkId, userId }, { items: [{ date: HOLIDAY, name: 'Ferry day' }] });
  const complaint = {
    networkId,
    startsAtSec: at('2026-11-18T03:30:00Z'),
    endsAtSec: at('2026-11-18T04:10:00Z'),
    kind: 'hum' as const,
    coarseLatitude: 54.12,
    coarseLongitude: 1.63,
    area: null,
    source: 'desk' as const,
    dueOn: '2026-11-30',
    createdBy: null,
  };
  await inTransaction(async (transaction) => {
    await insertLimit(
      networkId,
      {
        effectiveFromSec: 0,
        name: 'Holidays',
        metric: 'LAeq',
        averaging: '1h',
        bandFraction: null,
        bandIndex: null,
        thresholdTenths: 500,
        weekdays: 127,
        holidays: 'only',
        fromMin: 22 * 60,
        toMin: 6 * 60,
        minimumCoverage: null,
        stationIds: null,
        recipients: [],
        reason: '',
        createdBy: null,
      },
      transaction,
    );
    await insertComplaint(
      { ...complaint, nearestStationId: stationId, reference: 'T-2026-0001' },
      transaction,
    );
    await insertComplaint({ ...complaint, nearestStationId: otherId, reference: 'T-2026-0002' }, transaction);
  });
  const found = await findStation(networkId, 'TR-1');
  if (!found) throw new Error('The station is there.');
  station = found;
});

describe('a strip as the page hands it over', () => {
  test('has the complaints that its station is the nearest to, by reference, kind and window alone', async () => {
    expect((await stripTrack(station, period)).complaints).toEqual([
      {
        reference: 'T-2026-0001',
        kind: 'hum',
        fromSec: at('2026-11-18T03:30:00Z'),
        toSec: at('2026-11-18T04:10:00Z'),
      },
    ]);
  });

  test('draws a limit in the windows that are judged, on named dates', async () => {
    const { limits } = await stripTrack(station, period);
    const [limit] = limits;
    const [version] = await listLimitVersions(networkId);
    if (!limit || !version) throw new Error('The limit is there.');
    const judged = windowsOf(version, period.fromSec, period.toSec, await listSettings(networkId));
    const runs = joinRuns(judged.map(({ startSec, endSec }) => ({ fromSec: startSec, toSec: endSec })));
    expect(runs).toEqual([
      { fromSec: at('2026-11-18T00:00:00Z'), toSec: at('2026-11-18T06:00:00Z') },
      { fromSec: at('2026-11-18T22:00:00Z'), toSec: at('2026-11-19T00:00:00Z') },
    ]);
    expect(timesOfValidity(limit, period, await networkClocks(networkId))).toEqual(runs);
  });

  test('evidence of a complaint heeds them too', async () => {
    const timeline = await listSettings(networkId);
    const names = async (from: string, to: string) =>
      (await applyingLimits(station, at(from), at(to), timeline)).inForce.map(({ limit }) => limit);
    expect(await names('2026-11-18T03:30:00Z', '2026-11-18T04:10:00Z')).toEqual(['Holidays']);
    expect(await names('2026-11-19T03:30:00Z', '2026-11-19T04:10:00Z')).toEqual([]);
  });
});
