import { type Section } from './sections';

export interface KeyGroup {
  title: string;
  keys: { press: readonly string[]; does: string }[];
}

interface Place {
  pathname: string;
  section: Section | undefined;
  hasSearch: boolean;
}

const STRIP: KeyGroup = {
  title: 'The strip, while it has the focus',
  keys: [
    { press: ['←', '→'], does: 'move the cursor through time; with Shift in bigger steps' },
    { press: ['↑', '↓'], does: 'move it through the bands; below the lowest it stands on the level' },
    { press: ['Home', 'End'], does: 'move it to the beginning or the end of what is shown' },
    { press: ['Enter'], does: 'begin a selection, and end it' },
    { press: ['Esc'], does: 'clear the selection' },
    { press: ['+', '−'], does: 'zoom in and out about the cursor' },
    { press: ['Page ↑', 'Page ↓'], does: 'go half a view earlier or later' },
  ],
};

const MAP: KeyGroup = {
  title: 'The map',
  keys: [
    { press: ['Tab'], does: 'go through the stations, on the map and in the list beside it' },
    { press: ['Enter'], does: 'show the station at a glance' },
    { press: ['+', '−'], does: 'zoom in and out while the map has the focus' },
    { press: ['←', '→', '↑', '↓'], does: 'move the map while it has the focus' },
  ],
};

const EVERYWHERE: KeyGroup['keys'] = [
  { press: ['?'], does: 'show this list' },
  { press: ['Tab'], does: 'go to the next link, button or field; with Shift to the one before' },
  { press: ['Enter'], does: 'follow a link, press a button; on a heading of a table sort by it' },
  { press: ['Esc'], does: 'close what stands over the page' },
];

/** The keys that do something on a page: its own first, then those of every page. */
export function keysOf({ pathname, section, hasSearch }: Place): KeyGroup[] {
  const search = { press: ['Ctrl K', '/'], does: 'search for a page, station, limit, reference or month' };
  return [
    ...(/\/stations\/[^/]+$/.test(pathname) && !pathname.endsWith('/stations/new') ? [STRIP] : []),
    ...(section === 'map' ? [MAP] : []),
    { title: 'Every page', keys: [...(hasSearch ? [search] : []), ...EVERYWHERE] },
  ];
}
