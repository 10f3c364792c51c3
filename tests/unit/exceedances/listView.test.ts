import { expect, test } from 'vitest';
import { filterOf, interfaceQuery, listQuery, readListView } from '#components/exceedances/listView.ts';

const ZONE = 'Europe/London';
const NOW_SEC = Date.parse('2026-07-01T12:00:00Z') / 1000;
const stations = [{ id: 7, code: 'MER-01' }];
const viewOf = (query: string) =>
  readListView(new URL(`http://merrow.example/n/merrow/exceedances${query}`), ZONE, NOW_SEC);

test('an address is read and written back as it was; the interface gets the same in UTC', () => {
  const query =
    '?from=2026-07-01T00:00&to=2026-07-02T00:00&station=MER-01&limit=3&state=standing&acknowledged=no';
  const view = viewOf(query);
  expect(listQuery(view, ZONE)).toBe(query);
  expect(interfaceQuery(view)).toBe(
    '?from=2026-06-30T23:00:00Z&to=2026-07-01T23:00:00Z&station=MER-01&limitId=3&state=standing&acknowledged=no',
  );
  expect(filterOf(view, stations)).toMatchObject({
    stationId: 7,
    limitId: 3,
    state: 'standing',
    isAcknowledged: false,
  });
});

test('without anything, or with words that mean nothing, the list is whole', () => {
  for (const query of ['', '?state=odd&acknowledged=perhaps&limit=-1&station=']) {
    const view = viewOf(query);
    expect(listQuery(view, ZONE)).toBe('');
    expect(filterOf(view, stations)).toEqual({});
  }
});
