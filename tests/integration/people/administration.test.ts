import { beforeAll, describe, expect, test } from 'vitest';
import { findAuditBreak } from '#db/queries/audit';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { meStatus, signInStatus } from './support';

useFreshSchema();

interface Signed {
  userId: string;
  session: string;
}

let homeId: number;
let administrator: Signed;
let second: Signed;

beforeAll(async () => {
  homeId = await makeNetwork('home');
  await makeNetwork('away');
  administrator = await makePerson(null, [], true);
  second = await makePerson(null, [], true);
});

const patch = (userId: string, body: object, { session }: Signed = administrator) =>
  callApi('PATCH', `/api/v1/people/${userId}`, { session, body });

const stationsStatus = async (network: string, { session }: Signed) =>
  (await callApi('GET', `/api/v1/networks/${network}/stations`, { session })).status;

describe('who may administer', () => {
  test.each(['operator', 'liaison', 'regulator'] as const)('the %s may not', async (role) => {
    const { userId, session } = await makePerson(homeId, [role]);
    const calls: [string, string, object?][] = [
      ['GET', '/api/v1/people'],
      ['POST', '/api/v1/people', { name: 'A', email: 'a@people.example', isAdministrator: true }],
      ['GET', `/api/v1/people/${userId}`],
      ['PATCH', `/api/v1/people/${userId}`, { isAdministrator: true }],
      ['PATCH', `/api/v1/people/${administrator.userId}`, { disabled: true }],
      ['POST', `/api/v1/people/${administrator.userId}/password`, {}],
      ['GET', '/admin/audit.csv'],
    ];
    for (const [method, path, body] of calls) {
      const answer = await callApi(method, path, { session, body });
      expect(answer.status, `${method} ${path}`).toBe(403);
    }
    const me = await (await callApi('GET', '/api/v1/me', { session })).json();
    expect(me).toMatchObject({ isAdministrator: false });
  });

  test('an access token of the administrator reads, and changes nobody', async () => {
    const made = await callApi('POST', '/api/v1/me/tokens', {
      session: administrator.session,
      body: { name: 'script', days: 7 },
    });
    const { token } = await made.json();
    expect((await callApi('GET', '/api/v1/people', { token })).status).toBe(200);
    const target = `/api/v1/people/${second.userId}`;
    expect((await callApi('PATCH', target, { token, body: { disabled: true } })).status).toBe(403);
    expect((await callApi('POST', `${target}/password`, { token, body: {} })).status).toBe(403);
    expect((await callApi('POST', '/api/v1/me/tokens', { token, body: { name: 'x', days: 7 } })).status).toBe(
      403,
    );
  });
});

describe('people', () => {
  test('one added signs in with the password told once, and with the roles given', async () => {
    const body = {
      name: 'Ines',
      email: 'ines@people.example',
      roles: [{ network: 'home', role: 'liaison' }],
    };
    const added = await callApi('POST', '/api/v1/people', { session: administrator.session, body });
    expect(added.status).toBe(201);
    const { person, password } = await added.json();
    expect(person).toMatchObject({ roles: body.roles, isAdministrator: false, disabledAt: null });
    expect(await signInStatus(body.email, password)).toBe(204);
    const again = await callApi('POST', '/api/v1/people', { session: administrator.session, body });
    expect(again.status).toBe(422);
    expect(await again.json()).toMatchObject({ fields: [{ field: 'email' }] });
  });

  test('a role in a network that does not exist, a short password, a wrong address: said by field', async () => {
    const post = async (body: object) => {
      const answer = await callApi('POST', '/api/v1/people', { session: administrator.session, body });
      expect(answer.status).toBe(422);
      return (await answer.json()).fields[0].field;
    };
    const good = { name: 'Jon', email: 'jon@people.example' };
    expect(await post({ ...good, roles: [{ network: 'nowhere', role: 'liaison' }] })).toBe('roles');
    expect(await post({ ...good, password: 'short' })).toBe('password');
    expect(await post({ ...good, email: 'nobody' })).toBe('email');
  });

  test('a change of role holds at the next request', async () => {
    const person = await makePerson(homeId, ['operator']);
    expect(await stationsStatus('home', person)).toBe(200);
    expect(await stationsStatus('away', person)).toBe(404);
    const roles = [{ network: 'away', role: 'regulator' }];
    expect((await patch(person.userId, { roles })).status).toBe(200);
    expect(await stationsStatus('home', person)).toBe(404);
    expect(await stationsStatus('away', person)).toBe(200);
    const change = await callApi('POST', '/api/v1/networks/away/stations', {
      session: person.session,
      body: {},
    });
    expect(change.status).toBe(403);
  });

  test('a disabled person is out at once, tokens too, and back with the same roles', async () => {
    const person = await makePerson(homeId, ['operator']);
    const made = await callApi('POST', '/api/v1/me/tokens', {
      session: person.session,
      body: { name: 'script', days: 7 },
    });
    const { token } = await made.json();
    expect(await meStatus({ token })).toBe(200);
    expect((await patch(person.userId, { disabled: true })).status).toBe(200);
    expect(await meStatus({ session: person.session })).toBe(401);
    expect(await meStatus({ token })).toBe(401);
    const enabled = await patch(person.userId, { disabled: false });
    expect(await enabled.json()).toMatchObject({
      person: { disabledAt: null, roles: [{ network: 'home', role: 'operator' }] },
    });
  });

  test('a password reset ends every session', async () => {
    const person = await makePerson(homeId, ['regulator']);
    const path = `/api/v1/people/${person.userId}/password`;
    const reset = await callApi('POST', path, { session: administrator.session, body: {} });
    const { password } = await reset.json();
    expect(await meStatus({ session: person.session })).toBe(401);
    expect(await signInStatus(`${person.userId.slice(0, 8)}@people.example`, password)).toBe(204);
  });
});

describe('the last administrator', () => {
  test('nobody takes away their own access; the last one loses it to nobody', async () => {
    for (const body of [{ disabled: true }, { isAdministrator: false }]) {
      const own = await patch(administrator.userId, body);
      expect(own.status).toBe(409);
      expect(await own.json()).toMatchObject({ code: 'yourself' });
    }
    const own = await callApi('POST', `/api/v1/people/${administrator.userId}/password`, {
      session: administrator.session,
      body: {},
    });
    expect(own.status).toBe(409);

    // Two who remove each other at the same moment: one of them stays.
    const outcomes = await Promise.all([
      patch(second.userId, { isAdministrator: false }, administrator),
      patch(administrator.userId, { isAdministrator: false }, second),
    ]);
    const statuses = outcomes.map(({ status }) => status).sort();
    expect(statuses[0]).toBe(200);
    expect([403, 409]).toContain(statuses[1]);
    const left = outcomes[0]?.status === 200 ? administrator : second;
    for (const body of [{ disabled: true }, { isAdministrator: false }]) {
      const refused = await patch(left.userId, body, left);
      expect(refused.status).toBe(409);
      expect(await refused.json()).toMatchObject({ code: 'last-administrator' });
    }
    const csv = await callApi('GET', '/admin/audit.csv?action=person.disable', { session: left.session });
    expect((await csv.text()).split('\r\n')[0]).toBe(
      'id,at,person,address,network,action,subject,details,words',
    );
    expect(await findAuditBreak()).toBeNull();
  });
});
