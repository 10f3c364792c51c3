import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findStation, type StationRow } from '#db/queries/stations';
import { FLAGS } from '#lib/acoustics/validity';
import { submitForm } from '#lib/http/forms';
import { changeFromForm, registerFromForm, retireFromForm } from '#lib/http/stationForm';
import { examplePost } from '#lib/services/stations/examplePost';
import { stationFormText } from '#lib/services/stations/formValues';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { postedForm, STATION_FORM } from './support';

useFreshSchema();

const zone = 'Europe/London';
let networkId: number;
let userId: string;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  ({ userId } = await makePerson(networkId, ['operator']));
});

const register = (fields: Record<string, string>) =>
  submitForm(postedForm(fields), (values) => registerFromForm(values, { networkId, userId, zone }));

async function stationOf(code: string): Promise<StationRow> {
  const found = await findStation(networkId, code);
  if (!found) throw new Error(`There is no ${code}.`);
  return found;
}

async function registered(code: string): Promise<{ station: StationRow; token: string }> {
  const outcome = await register({ ...STATION_FORM, code });
  if (!outcome.isDone) throw new Error(JSON.stringify(outcome.errors));
  return outcome.value;
}

describe('registering', () => {
  test('stores what was typed, decimal commas and proper minus signs too', async () => {
    await registered('MER-09');
    expect(await stationOf('MER-09')).toMatchObject({
      name: 'Ropewalk School',
      latitude: 54.1032,
      longitude: -1.5907,
      placement: 'facade',
      mastHeightM: 4.5,
      intervalSec: 60,
      firstBandIndex: -16,
      lastBandIndex: 10,
      acceptsFromSec: null,
    });
  });

  test('tells every wrong field at once and keeps what was typed', async () => {
    const wrong = {
      name: '',
      code: 'two words',
      latitude: 'north',
      longitude: '200',
      mastHeight: '-1',
      intervalSeconds: '0.5',
      firstBandHz: '1000',
      lastBandHz: '100',
      acceptsFrom: 'yesterday',
    };
    const outcome = await register({ ...STATION_FORM, ...wrong });
    if (outcome.isDone) throw new Error('It was registered.');
    const { firstBandHz, lastBandHz, ...singly } = wrong;
    expect(Object.keys(outcome.errors)).toEqual(expect.arrayContaining(Object.keys(singly)));
    expect(outcome.values.text).toMatchObject(wrong);
    const bands = await register({ ...STATION_FORM, code: 'MER-10', firstBandHz, lastBandHz });
    expect(!bands.isDone && bands.errors).toEqual({ lastBandHz: 'must not be below the lowest band' });
  });

  test('refuses a third as an octave’s end, and a code that is taken, whatever its case', async () => {
    const octaves = await register({ ...STATION_FORM, code: 'MER-11', bandFraction: '1' });
    expect(!octaves.isDone && Object.keys(octaves.errors)).toEqual(['firstBandHz', 'lastBandHz']);
    await registered('MER-12');
    const again = await register({ ...STATION_FORM, code: 'mer-12' });
    expect(!again.isDone && again.errors).toEqual({ code: 'belongs to another station of this network' });
  });

  test('an empty form and a body that is no form are refused, not an error', async () => {
    expect((await register({})).isDone).toBe(false);
    const request = new Request('http://127.0.0.1/', { method: 'POST', body: '{}' });
    const outcome = await submitForm(request, () => Promise.resolve('done'));
    expect(!outcome.isDone && outcome.errors).toEqual({
      '': 'What was sent is no form. Nothing was changed.',
    });
  });
});

describe('changing', () => {
  test('the form as it stands changes nothing, not even in the hour that comes twice', async () => {
    const { station } = await registered('MER-20');
    await db()('stations')
      .where({ id: station.id })
      .update({ accepts_from: Date.parse('2026-10-25T01:30:00Z') / 1000 });
    const before = await stationOf('MER-20');
    const entries = await auditOf('MER-20');
    const outcome = await change(before, stationFormText(before, zone));
    expect(outcome.isDone).toBe(true);
    expect(await stationOf('MER-20')).toEqual(before);
    expect(await auditOf('MER-20')).toEqual(entries);
  });

  test('an emptied field is refused instead of kept', async () => {
    const { station } = await registered('MER-21');
    const outcome = await change(station, { ...stationFormText(station, zone), latitude: '', name: ' ' });
    expect(!outcome.isDone && Object.keys(outcome.errors).sort()).toEqual(['latitude', 'name']);
  });
});

describe('expected flags', () => {
  test('are what is ticked, also nothing; an unknown one is refused', async () => {
    const { station } = await registered('MER-25');
    const text = { ...stationFormText(station, zone), expectedFlags: 'underrange' };
    expect((await change(station, text)).isDone).toBe(true);
    expect((await stationOf('MER-25')).expectedFlags).toBe(FLAGS.underrange);
    const refused = await change(await stationOf('MER-25'), { ...text, expectedFlags: 'odd' });
    expect(!refused.isDone && Object.keys(refused.errors)).toEqual(['expectedFlags']);
    expect((await change(await stationOf('MER-25'), stationFormText(station, zone))).isDone).toBe(true);
    expect((await stationOf('MER-25')).expectedFlags).toBe(0);
  });
});

describe('retiring', () => {
  test('needs a reason and the code, ends posts at once and stands in the audit trail; so does bringing back', async () => {
    const { station, token } = await registered('MER-30');
    const post = () =>
      callApi('POST', '/api/v1/intervals', { token, body: examplePost(station, Date.now() / 1000) });
    for (const [fields, field] of [
      [{ act: 'retire', reason: '', confirmation: 'MER-30' }, 'reason'],
      [{ act: 'retire', reason: 'Mast taken down', confirmation: 'MER-3' }, 'confirmation'],
      [{ act: 'sink', reason: 'Mast taken down', confirmation: 'MER-30' }, ''],
    ] as const) {
      const refused = await retire(station, fields);
      expect(!refused.isDone && Object.keys(refused.errors)).toEqual([field]);
    }
    expect((await post()).status).toBe(200);
    const given = { act: 'retire', reason: 'Mast taken down', confirmation: 'mer-30' };
    expect((await retire(station, given)).isDone).toBe(true);
    expect((await post()).status).toBe(401);
    const retired = await stationOf('MER-30');
    expect((await retire(retired, { act: 'bring-back', reason: 'New mast' })).isDone).toBe(true);
    expect((await post()).status).toBe(200);
    expect(await auditOf('MER-30')).toMatchObject([
      { action: 'station.register' },
      { action: 'station.retire', detail: { reason: 'Mast taken down' } },
      { action: 'station.bring-back', detail: { reason: 'New mast' } },
    ]);
  });
});

const change = (station: StationRow, fields: Record<string, string>) =>
  submitForm(postedForm(fields), (values) => changeFromForm(values, station, { userId, zone }));

const retire = (station: StationRow, fields: Record<string, string>) =>
  submitForm(postedForm(fields), (values) => retireFromForm(values, station, userId));

const auditOf = (code: string) =>
  db()('audit_log')
    .where({ subject: `station ${code}` })
    .orderBy('id')
    .select('action', 'detail');
