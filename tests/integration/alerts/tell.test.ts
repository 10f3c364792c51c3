import { beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import {
  DEFAULT_PREFERENCES,
  setAlertPreferences,
  type AlertPreferences,
} from '#db/queries/alertPreferences';
import { composeDueAlerts } from '#ingest/notify/composeAlerts';
import { requireAcknowledgeLink } from '#lib/auth/acknowledgeLink';
import { changeOwnAlerts, ownAlerts } from '#lib/services/alerts/preferences';
import { acknowledge } from '#lib/services/exceedances/acknowledge';
import { makeLimit } from '../exceedances/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { emailOf, findAndTell, liftAndTell, outbox, setRecipients } from './support';

useFreshSchema();

const PLAIN = 'duty@quay.example';
const at = (text: string) => new Date(`2026-02-03T${text}Z`);
let networks = 0;
let networkId: number;
let stationId: number;
let otherStationId: number;
let userId: string;
let email: string;
let limit: Awaited<ReturnType<typeof makeLimit>>;

beforeEach(async () => {
  networks += 1;
  networkId = await makeNetwork(`alerts-${networks}`);
  stationId = await makeStation(networkId, 'AL-1');
  otherStationId = await makeStation(networkId, 'AL-2');
  userId = (await makePerson(networkId, ['operator'])).userId;
  email = await emailOf(userId);
  limit = await makeLimit(networkId, 'Quay');
  await setRecipients(limit.versionId, [email, PLAIN]);
  await db()('outbox').delete();
  await db()('alert_items').delete();
});

const prefer = (changes: Partial<AlertPreferences>) =>
  setAlertPreferences({ networkId, userId }, { ...DEFAULT_PREFERENCES, ...changes }, db());
const found = (time: string, levelDb = 57.4, station = stationId) =>
  findAndTell({ networkId, stationId: station, limit, now: at(time), levelDb });
const toPerson = async () => (await outbox()).filter(({ recipient }) => recipient === email);
const toPlain = async () => (await outbox()).filter(({ recipient }) => recipient === PLAIN);
const composeAll = async (time: string) => {
  while ((await composeDueAlerts(at(time))) > 0);
};

describe('when a person is told', () => {
  test('at once, a burst as one further message; an address without an account gets each at once', async () => {
    await prefer({ groupMin: 10 });
    await found('12:00:00');
    for (const second of ['10', '20', '30']) await found(`12:00:${second}`);
    expect(await toPerson()).toHaveLength(1);
    expect(await toPlain()).toHaveLength(4);
    await composeAll('12:09:59');
    expect(await toPerson()).toHaveLength(1);
    await composeAll('12:10:00');
    await composeAll('12:30:00');
    const mails = await toPerson();
    expect(mails).toHaveLength(2);
    expect(mails[1].subject).toContain('3 windows');
    expect(await db()('exceedance_mails').where({ outbox_id: mails[1].id })).toHaveLength(3);
  });

  test('a daily digest holds the day; two workers write it once', async () => {
    await prefer({ delivery: 'daily', dailyAtMin: 18 * 60 });
    for (const time of ['09:00:00', '12:00:00', '15:30:00']) await found(time);
    expect(await toPerson()).toHaveLength(0);
    await Promise.all([composeAll('18:00:00'), composeAll('18:00:00'), composeAll('18:00:00')]);
    expect(await toPerson()).toMatchObject([{ kind: 'exceedances' }]);
  });

  test('what changed before the digest is told as it is by then, once', async () => {
    await prefer({ delivery: 'daily', dailyAtMin: 18 * 60 });
    const finding = { networkId, stationId, limit, now: at('09:00:00'), levelDb: 57.4 };
    const id = await findAndTell(finding);
    await liftAndTell(finding, id, at('12:00:00'));
    await liftAndTell(finding, id, at('12:00:05'));
    await composeAll('18:00:00');
    const [mail, ...more] = await toPerson();
    expect(more).toEqual([]);
    expect(mail.subject).toBe('AL-1 Station AL-1: no longer above the limit');
    expect(mail.text_body).not.toContain('/acknowledge/');
    expect(await toPlain()).toHaveLength(2);
  });

  test('quiet hours hold back what is less than the override above the limit', async () => {
    await prefer({ quietFromMin: 22 * 60, quietToMin: 6 * 60, overrideTenths: 100, groupMin: 0 });
    await found('02:00:00', 64.9);
    expect(await toPerson()).toHaveLength(0);
    await found('02:30:00', 65);
    expect(await toPerson()).toHaveLength(1);
    await composeAll('06:00:00');
    expect(await toPerson()).toHaveLength(2);
  });

  test('chosen stations only', async () => {
    await prefer({ stationIds: [otherStationId], groupMin: 0 });
    await found('12:00:00');
    await found('12:10:00', 58, otherStationId);
    expect((await toPerson()).map(({ subject }) => subject)).toEqual([expect.stringContaining('AL-2')]);
  });

  test('chosen on the page’s terms, audited; a station of another network is refused', async () => {
    const input = {
      ...{ delivery: 'hourly' as const, dailyAt: 420, groupMinutes: 5, quietFrom: 1320, quietTo: 360 },
      ...{ override: 9.96, stations: ['AL-1'], warnsEarly: true },
    };
    expect((await changeOwnAlerts({ networkId, userId }, { ...input, stations: ['FAR-9'] })).kind).toBe(
      'invalid',
    );
    expect((await changeOwnAlerts({ networkId, userId }, input)).kind).toBe('done');
    const own = await ownAlerts({ networkId, userId }, email.toUpperCase());
    expect(own.preferences).toMatchObject({ overrideTenths: 100, stationIds: [stationId], warnsEarly: true });
    expect(own.namingLimits).toEqual(['Quay']);
    expect(await db()('audit_log').where({ user_id: userId })).toMatchObject([
      { action: 'alert-preferences.change' },
    ]);
  });
});

describe('the link that acknowledges', () => {
  const now = Math.floor(Date.now() / 1000);

  async function linkOf(): Promise<{ token: string; exceedanceId: number }> {
    const exceedanceId = await findAndTell({ networkId, stationId, limit, now: new Date(), levelDb: 58 });
    const [mail] = await toPerson();
    const token = /\/acknowledge\/([\w.-]+)/.exec(mail.text_body)?.[1] ?? '';
    expect(mail.html_body).toContain(token);
    return { token, exceedanceId };
  }

  test('lets its person acknowledge that exceedance, once, and says so in the audit trail', async () => {
    const { token, exceedanceId } = await linkOf();
    expect((await toPlain())[0].text_body).not.toContain('/acknowledge/');
    const link = await requireAcknowledgeLink(token, now);
    expect(link).toMatchObject({ exceedanceId, user: { id: userId } });
    expect(await db()('exceedances').where({ id: exceedanceId }).first('acknowledged_at')).toEqual({
      acknowledged_at: null,
    });
    const given = { note: 'Seen.', cause: null, causeDetail: null, version: null };
    const request = { networkId, id: exceedanceId, userId, given, isByMailLink: true };
    expect((await acknowledge(request)).kind).toBe('acknowledged');
    expect((await acknowledge({ ...request, given: { ...given, note: 'Again.' } })).kind).toBe(
      'changed-meanwhile',
    );
    const [entry] = await db()('audit_log').where({
      action: 'exceedance.acknowledge',
      network_id: networkId,
    });
    expect(entry.user_id).toBe(userId);
    expect(JSON.stringify(entry.detail)).toContain('mail link');
  });

  test('a changed or foreign one is none, an old one has run out, and the role is judged when it is used', async () => {
    const { token, exceedanceId } = await linkOf();
    const refusal = (text: string, atSec = now) =>
      requireAcknowledgeLink(text, atSec).then(
        () => 'let in',
        (error: { status: number }) => error.status,
      );
    const [, person, until, signed] = token.split('.');
    expect(await refusal(`${exceedanceId + 1}.${person}.${until}.${signed}`)).toBe(404);
    expect(await refusal(`${exceedanceId}.${person}.${Number(until) + 1}.${signed}`)).toBe(404);
    expect(await refusal(`${token}x`)).toBe(404);
    expect(await refusal('')).toBe(404);
    expect(await refusal(token, Number(until) - 1)).toBe('let in');
    expect(await refusal(token, Number(until))).toBe(410);
    await db()('memberships').where({ user_id: userId }).update({ role: 'regulator' });
    expect(await refusal(token)).toBe(403);
    await db()('memberships').where({ user_id: userId }).delete();
    expect(await refusal(token)).toBe(403);
    await db()('users').where({ id: userId }).update({ is_administrator: true, disabled_at: new Date() });
    expect(await refusal(token)).toBe(403);
  });

  test('a regulator who is named in a limit gets no such link', async () => {
    await db()('memberships').where({ user_id: userId }).update({ role: 'regulator' });
    await found('12:00:00');
    expect((await toPerson())[0].text_body).not.toContain('/acknowledge/');
  });
});
