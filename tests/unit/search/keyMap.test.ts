import { expect, test } from 'vitest';
import { keysOf } from '#components/shell/keyMap.ts';

const titles = (pathname: string, section?: 'map' | 'stations') =>
  keysOf({ pathname, section, hasSearch: true }).map(({ title }) => title);

test('a page lists its own keys before those of every page', () => {
  const strip = 'The strip, while it has the focus';
  expect(titles('/n/merrow/stations/MER-01', 'stations')).toEqual([strip, 'Every page']);
  expect(titles('/n/merrow/map', 'map')).toEqual(['The map', 'Every page']);
  for (const path of ['/n/merrow/stations', '/n/merrow/stations/new', '/n/merrow/stations/MER-01/figures']) {
    expect(titles(path, 'stations')).toEqual(['Every page']);
  }
});

test('the search is offered where there is a network to search', () => {
  const presses = (hasSearch: boolean) =>
    keysOf({ pathname: '/account', section: undefined, hasSearch }).flatMap(({ keys }) =>
      keys.flatMap(({ press }) => press),
    );
  expect(presses(true)).toContain('Ctrl K');
  expect(presses(false)).not.toContain('Ctrl K');
});
