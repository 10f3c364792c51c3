import { expect, test } from 'vitest';
import { newLimitSchema } from '#lib/contracts/limits';
import { queryValues } from '#lib/http/forms';
import { limitOfForm } from '../../../src/pages/n/[network]/limits/_limitForm';
import { settingHref, trialOfForm, triedValues } from '../../../src/pages/n/[network]/limits/_trialForm';

const ZONE = 'Europe/London';
const ASKED =
  'metric=bandLeq&band=3:100&window=1h&threshold=55,5&weekdays=mon&weekdays=tue&from=22:00&to=06:00&scope=chosen' +
  '&stations=A-1&stations=B-2&minimumCoverage=60&since=2026-03-01&until=2026-03-31';

const asked = (more = '') => new URLSearchParams(ASKED + more);

test('an address is read as what the form asks; the last date counts', () => {
  expect(trialOfForm(queryValues(asked('&limit=7')), ZONE)).toMatchObject({
    from: '2026-03-01',
    to: '2026-04-01',
    basedOn: 7,
    limit: { threshold: 55.5, bandHz: 100, weekdays: ['mon', 'tue'], stations: ['A-1', 'B-2'], from: 1320 },
  });
});

test('what was tried fills the form that sets it, without the dates', () => {
  const href = new URL(settingHref('/n/x/limits', asked()), 'http://127.0.0.1');
  expect(href.pathname).toBe('/n/x/limits/new');
  expect(href.searchParams.has('since')).toBe(false);
  const { text, all } = queryValues(href.searchParams);
  const set = newLimitSchema.parse(limitOfForm({ text: { ...text, name: 'Trial' }, all }, ZONE));
  expect(set).toEqual(trialOfForm(queryValues(asked()), ZONE).limit);
});

test('of a limit that is changed, the name and the addresses stay as saved', () => {
  expect(settingHref('/n/x/limits', asked('&limit=7'))).toMatch(/^\/n\/x\/limits\/7\/edit\?metric=/);
  const saved = { text: { name: 'Night', recipients: 'a@x.example', threshold: '40' }, all: () => [] };
  const values = triedValues(queryValues(asked()), saved);
  expect(values.text).toMatchObject({ name: 'Night', recipients: 'a@x.example', threshold: '55,5' });
  expect(values.all('stations')).toEqual(['A-1', 'B-2']);
  expect(triedValues(queryValues(new URLSearchParams()), saved)).toBe(saved);
});

test.each([
  ['&until=2026-02-27', 'until'],
  ['&until=2027-03-02', 'until'],
  ['&since=yesterday', 'since'],
])('dates that do not fit are told by their field: %s', (more, field) => {
  const query = asked();
  for (const [name, value] of new URLSearchParams(more)) query.set(name, value);
  expect(() => trialOfForm(queryValues(query), ZONE)).toThrow(
    expect.objectContaining({ issues: [expect.objectContaining({ path: [field] })] }),
  );
});
