import { expect, test } from 'vitest';
import { figureName } from '#components/summaries/figureName.ts';

test('a changed figure is told in plain words', () => {
  expect([
    figureName('figures Lday'),
    figureName('days 2026-03-12 Lday'),
    figureName('days 2026-03-02 coverage'),
    figureName('hours 2026-03-29 1:00 LAeq'),
    figureName('bands 1000 Hz L90'),
    figureName('yearToDate U Lden'),
    figureName('exceedances standing'),
    figureName('figures terms driftKnown'),
  ]).toEqual([
    'Lday, the month',
    '12 Mar 2026: Lday',
    '2 Mar 2026: coverage (share)',
    '29 Mar 2026 1:00: LAeq',
    '1000 Hz L90, band',
    'U Lden, year to date',
    'standing, exceedances',
    'terms drift known, the month',
  ]);
});
