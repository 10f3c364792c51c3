import { describe, expect, test } from 'vitest';
import { draftReply } from '#lib/services/complaints/letter/draftReply';
import { exceedance, letterFacts, stationEvidence } from './evidenceFixture';

const draft = (...args: Parameters<typeof letterFacts>) => draftReply(letterFacts(...args));

describe('a quiet night', () => {
  const text = draft([stationEvidence()]);

  test('thanks, names the window in the network’s zone and the reference', () => {
    expect(text).toContain('Dear Ada Wren,');
    expect(text).toContain('the hum on Tuesday 17 March 2026 between 03:10 and 03:40');
    expect(text).toContain('MER-2026-0042');
    expect(text).toMatch(/Yours sincerely,\nLia Teal\nMerrow estuary$/);
  });

  test('carries the figures with their coverage and where the station stands', () => {
    expect(text).toContain(
      'Our nearest station, Ropewalk School, about 350 m to the north-east of you, measured 100 % of that time. ' +
        'The average level there was 43.1 dB(A), and the loudest moment reached 58.4 dB(A).',
    );
    expect(text).toContain(
      'nine tenths of the time it was 39.8 dB(A) or more, for one tenth of the time 45.2 dB(A)',
    );
  });

  test('explains the level by that place at that hour, and does not deny what was heard', () => {
    expect(text).toContain(
      'On the four Tuesdays before, the average level at the same hours and the same place was mostly between 42.5 and 46.1 dB(A)',
    );
    expect(text).toContain('about as loud as usual there');
    expect(text).toContain(
      'No exceedance of the limits that apply at this station is on record for that time.',
    );
    expect(text).toContain('does not mean that the sound could not be heard');
    expect(text).toContain('not your home');
    expect(text).toContain('competent authority');
  });
});

test('loud within the limits: louder than usual by the difference of tenths, and still within', () => {
  const text = draft([stationEvidence({ LAeq: 49.3 })]);
  expect(text).toContain('louder than usual there, 5.3 dB above that middle value');
  expect(text).toContain('No exceedance of the limits');
});

test('quieter than usual says so', () => {
  expect(draft([stationEvidence({ LAeq: 40 })])).toContain(
    'quieter than usual there, 4.0 dB below that middle value',
  );
});

describe('over a limit', () => {
  test('names the limit, its window, level and threshold, and leaves the lifted one out', () => {
    const lifted = exceedance({ id: 8, limit: 'Old story', state: 'lifted' });
    const text = draft([stationEvidence({ LAeq: 52.3, exceedances: [exceedance(), lifted] })]);
    expect(text).toContain(
      'A limit was exceeded: “Night hours” (LAeq,1 h), on Tuesday 17 March 2026 between 03:00 and 04:00: ' +
        'measured 52.3 dB, limit 50.0 dB.',
    );
    expect(text).not.toContain('Old story');
    expect(text).not.toContain('No exceedance');
  });

  test('lists several, and counts what it does not list', () => {
    const eight = Array.from({ length: 8 }, (_, n) => exceedance({ id: n, limit: `Limit ${n}` }));
    const text = draft([stationEvidence({ exceedances: eight })]);
    expect(text).toContain('exceeded 8 times');
    expect(text.match(/^– “Limit/gm)).toHaveLength(6);
    expect(text).toContain('– and 2 more.');
  });

  test('a maximum over the limit is told even where the coverage is too low to compare levels', () => {
    const text = draft([
      stationEvidence({
        coverage: 0.4,
        meetsMinimum: false,
        exceedances: [exceedance({ metric: 'LAFmax' })],
      }),
    ]);
    expect(text).toContain('A limit was exceeded: “Night hours” (LAFmax)');
  });
});

test('no limit set, none that applies then, and windows not judged yet, are told as such', () => {
  const atNight = draft([stationEvidence({ limits: { set: 1, applying: 0, unjudged: 0 } })]);
  expect(atNight).toContain('None of the limits set for this station applies at that time.');
  expect(atNight).not.toContain('No exceedance');
  expect(draft([stationEvidence({ limits: { set: 0, applying: 0, unjudged: 0 } })])).toContain(
    'No limit is set for this station',
  );
  const unjudged = draft([stationEvidence({ limits: { set: 1, applying: 1, unjudged: 2 } })]);
  expect(unjudged).toContain('has been judged yet; so far no exceedance is on record');
  expect(unjudged).not.toContain('No exceedance of the limits');
});

describe('a tone', () => {
  const tone = { lowerHz: 89.125, upperHz: 112.2, excess: 15.8, method: 'survey' } as const;

  test('is told as a range, not as a cause', () => {
    const text = draft([stationEvidence({ tones: [tone] })]);
    expect(text).toContain('from 89.1 to 112 Hz: it was 15.8 dB above the ranges beside it');
    expect(text).toContain('not what made it');
  });

  test('“none” is said only where it can be assessed', () => {
    expect(draft([stationEvidence()])).toContain('No single tone stood out of the average spectrum');
    const octaves = draft([stationEvidence({ tonality: 'octave-bands' })]);
    expect(octaves).toContain('too wide to tell');
    expect(octaves).not.toContain('No single tone');
    expect(draft([stationEvidence({ tonality: 'averaged-too-short' })])).not.toContain('tone');
  });
});

const silent = (changes = {}) =>
  stationEvidence({
    sampleSeconds: null,
    LAeq: null,
    LAFmax: null,
    LA10: null,
    LA90: null,
    coverage: 0,
    meetsMinimum: false,
    seconds: { expected: 1800, valid: 0, excluded: 0 },
    tonality: 'no-data',
    ...changes,
  });

describe('no data', () => {
  test('says so, gives no level, compares nothing, and does not call it quiet', () => {
    const text = draft([silent()]);
    expect(text).toContain('has sent no measurements of that time so far');
    expect(text).toContain('neither confirm nor rule out');
    expect(text).toContain('missing data are not silence');
    expect(text).not.toMatch(/dB\(A\)|usual|No exceedance|tone/);
  });

  test('excluded measurements are told apart from missing ones', () => {
    const text = draft([silent({ seconds: { expected: 1800, valid: 0, excluded: 1800 } })]);
    expect(text).toContain('none that may be used');
  });

  test('another station that did measure is told with its distance', () => {
    const farthest = stationEvidence({ station: 'MER-01', name: 'Quay Head' });
    const far = stationEvidence({ station: 'MER-02', name: 'Silo Lane', LAeq: 47 });
    const facts = letterFacts([silent(), farthest, far]);
    const text = draftReply({
      ...facts,
      whereabouts: {
        ...facts.whereabouts,
        'MER-01': { distanceM: 2000, wind: 'east', bearingDeg: 90 },
        'MER-02': { distanceM: 1240, wind: 'south', bearingDeg: 180 },
      },
    });
    expect(text).not.toContain('Quay Head');
    expect(text).toContain('A station further away did measure');
    expect(text).toContain('Our station Silo Lane, about 1.2 km to the south of you, measured 100 %');
    expect(text).toContain('47.0 dB(A)');
  });

  test('no station at all', () => {
    expect(draft([])).toContain('None of our stations was measuring near you');
  });
});

test('partial data: the part is given, and nothing is compared with it', () => {
  const text = draft([
    stationEvidence({
      coverage: 0.42,
      meetsMinimum: false,
      seconds: { expected: 1800, valid: 756, excluded: 0 },
    }),
  ]);
  expect(text).toContain('measured only 42 % of that time usably, less than the 75 %');
  expect(text).toContain('In the part that was measured: the average level there was 43.1 dB(A)');
  expect(text).toContain('says nothing about the rest of the time');
  expect(text).not.toMatch(/as usual|than usual|No exceedance|tone stood/);
});

test('too few comparable weeks say nothing about what is usual', () => {
  const two = draft([
    stationEvidence({ usual: { weeks: 4, validWeeks: 2, median: 44, low: 43.2, high: 44.8 } }),
  ]);
  expect(two).toContain('On two of the four Tuesdays before, the same hours were measured well enough');
  expect(two).toContain('too little to say what is usual');
  expect(two).not.toMatch(/than usual there|as usual there/);
  const none = draft([
    stationEvidence({ usual: { weeks: 4, validWeeks: 0, median: null, low: null, high: null } }),
  ]);
  expect(none).toContain('None of the four Tuesdays before has enough measurements');
});

describe('the night of a clock change', () => {
  test('the repeated hour: each time says its distance from universal time', () => {
    const text = draft([stationEvidence()], { from: '2026-10-25T00:30:00Z', to: '2026-10-25T01:30:00Z' });
    expect(text).toContain('on Sunday 25 October 2026 between 01:30 (UTC+1) and 01:30 (UTC+0)');
    expect(text).toContain('The clocks went back by 60 minutes around that time.');
  });

  test('the skipped hour in spring', () => {
    const text = draft([stationEvidence()], { from: '2026-03-29T00:30:00Z', to: '2026-03-29T01:30:00Z' });
    expect(text).toContain('between 00:30 (UTC+0) and 02:30 (UTC+1)');
    expect(text).toContain('The clocks went forward by 60 minutes');
  });

  test('an ordinary night has no such sentence, and one across midnight names both dates', () => {
    const text = draft([stationEvidence()], { from: '2026-03-17T23:10:00Z', to: '2026-03-18T01:40:00Z' });
    expect(text).toContain('from Tuesday 17 March 2026, 23:10, to Wednesday 18 March 2026, 01:40');
    expect(text).not.toMatch(/clocks|UTC/);
  });
});

test('without a name or a place the letter invents neither', () => {
  const facts = letterFacts([stationEvidence()]);
  const text = draftReply({ ...facts, recipientName: null, whereabouts: {} });
  expect(text).toContain('Dear resident,');
  expect(text).toContain('Our nearest station, Ropewalk School, measured');
  expect(text).not.toMatch(/ of you/);
});

test('coverage is never rounded up to all or down to nothing', () => {
  expect(draft([stationEvidence({ coverage: 0.9994 })])).toContain('measured 99 % of that time');
  expect(draft([stationEvidence({ coverage: 0.001, meetsMinimum: false })])).toContain('less than 1 %');
});
