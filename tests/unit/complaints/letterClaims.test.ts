import { describe, expect, test } from 'vitest';
import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import { STANDARD_LETTER } from '#lib/services/complaints/letter/draftReply';
import { LETTER_FIELDS, neededStatements } from '#lib/services/complaints/letter/fields';
import {
  letterProblems,
  missingStatements,
  renderLetter,
} from '#lib/services/complaints/letter/renderLetter';
import { exceedance, letterFacts, stationEvidence } from './evidenceFixture';

const eightWeeks = { weeks: 8, validWeeks: 8, median: 44, low: 42.5, high: 46.1 };
const station = (changes: Partial<StationEvidence> = {}) =>
  stationEvidence({ usual: eightWeeks, ...changes });
const second = (changes: Partial<StationEvidence> = {}) =>
  station({ station: 'MER-02', name: 'Silo Lane', ...changes });
const standing = (distanceM: number) => ({
  whereabouts: { 'MER-04': { distanceM, wind: 'north-east' as const, bearingDeg: 45 } },
});
const letter = (...args: Parameters<typeof letterFacts>) =>
  renderLetter(STANDARD_LETTER, letterFacts(...args));
const silent = station({
  LAeq: null,
  LAFmax: null,
  LA10: null,
  LA90: null,
  coverage: 0,
  meetsMinimum: false,
  seconds: { expected: 1800, valid: 0, excluded: 0 },
  tonality: 'no-data',
});

describe('two stations that disagree', () => {
  test('one over a limit, the other not: both are told, and neither is preferred', () => {
    const text = letter([station({ LAeq: 52.3, exceedances: [exceedance()] }), second({ LAeq: 43 })]);
    expect(text).toContain('A limit was exceeded: “Night hours”');
    expect(text).toContain(
      'Our station Silo Lane measured an average level of 43.0 dB(A) in the same time, about as loud as usual for that place and ' +
        'hour, and no exceedance is on record there for that time.',
    );
    expect(text).toContain('The two stations do not tell the same story.');
  });

  test('within the limits at the nearest, but louder than usual at the other', () => {
    const text = letter([station(), second({ LAeq: 50 })]);
    expect(text).toContain('50.0 dB(A) in the same time, louder than usual for that place and hour');
  });

  test('stations that tell the same are not played off against each other', () => {
    expect(letter([station(), second({ LAeq: 45 })])).not.toContain('same story');
    const both = { LAeq: 52.3, exceedances: [exceedance()] };
    expect(letter([station(both), second(both)])).not.toContain('same story');
  });

  test('too little data or too few weeks make no disagreement', () => {
    expect(letter([station(), second({ LAeq: 60, meetsMinimum: false, coverage: 0.3 })])).not.toContain(
      'same story',
    );
    const few = { ...eightWeeks, validWeeks: 2 };
    expect(letter([station(), second({ LAeq: 60, usual: few })])).not.toContain('same story');
  });
});

describe('how far the station speaks for the place', () => {
  test.each([
    [350, null],
    [800, 'tell what could be heard in the area rather than what reached you'],
    [2400, 'too far to tell what reached you'],
  ])('at %i m', (distanceM, told) => {
    const text = letter([station()], {}, standing(distanceM));
    if (told === null) expect(text).not.toContain('where you heard the sound');
    else expect(text).toContain(told);
  });

  test('a place that is not known is said to be', () => {
    expect(letter([station()], {}, { whereabouts: {} })).toContain(
      'We do not know exactly where you heard the sound',
    );
  });
});

describe('figures by field', () => {
  const say = (body: string, found: StationEvidence) => renderLetter(body, letterFacts([found]));

  test('carry their caveats: nothing measured, or a part only', () => {
    expect(say('{{laeq}}', station())).toBe('43.1 dB(A)');
    expect(say('{{laeq}}', station({ coverage: 0.42, meetsMinimum: false }))).toBe(
      '43.1 dB(A) (measured 42 % of the time only)',
    );
    for (const { name, kind } of LETTER_FIELDS) {
      if (
        kind === 'figure' &&
        !['distance', 'direction', 'coverage', 'usual-middle', 'usual-range'].includes(name)
      ) {
        expect(say(`{{${name}}}`, silent), name).not.toMatch(/\d+\.\d dB\(A\)$/);
      }
    }
    expect(say('{{laeq}}', silent)).toBe('not measured');
    expect(say('{{coverage}}', silent)).toBe('0 %');
  });

  test('what is usual is told of three weeks and more only', () => {
    const few = { ...eightWeeks, validWeeks: 2 };
    expect(say('{{usual-range}}, {{difference}}', station({ usual: few }))).toBe('not known, not known');
    expect(say('{{usual-range}}, {{difference}}', station())).toBe('42.5 to 46.1 dB(A), 0.9 dB less');
  });

  test('a name with braces is text, and is not filled in again', () => {
    const facts = letterFacts([station()], {}, { recipientName: '{{laeq}}' });
    expect(renderLetter('Dear {{name}},', facts)).toBe('Dear {{laeq}},');
  });
});

describe('what a letter must not lack', () => {
  test('a letter without figures needs nothing; one with figures says what they rest on', () => {
    const facts = letterFacts([station()]);
    expect(missingStatements('Dear {{name}}, we are looking into it.', facts)).toEqual([]);
    expect(missingStatements('It was {{laeq}}.', facts)).toEqual(['measured']);
  });

  test.each([
    ['over a limit', [station({ exceedances: [exceedance()] })], {}, {}, 'limits'],
    ['a station far away', [station()], {}, standing(2400), 'representative'],
    ['two stations disagreeing', [station(), second({ LAeq: 50 })], {}, {}, 'second-station'],
    [
      'the night of a clock change',
      [station()],
      { from: '2026-10-25T00:30:00Z', to: '2026-10-25T01:30:00Z' },
      {},
      'clock-change',
    ],
  ] as const)('%s', (_, stations, evidence, changes, needed) => {
    const facts = letterFacts([...stations], evidence, changes);
    expect(missingStatements('{{measured}}', facts)).toEqual([needed]);
    expect(missingStatements(STANDARD_LETTER, facts)).toEqual([]);
  });

  test('only statements that every letter can have are ever asked for', () => {
    const names = new Set(LETTER_FIELDS.map(({ name }) => name));
    const facts = letterFacts(
      [station({ exceedances: [exceedance()] }), second({ LAeq: 60 })],
      {},
      standing(2400),
    );
    expect(neededStatements(facts).length).toBeGreaterThan(2);
    for (const name of neededStatements(facts)) expect(names.has(name)).toBe(true);
  });
});

describe('typing', () => {
  test.each(['43 dB', '43.1dB(A)', 'about 50 decibels', '43,1 dB'])('a level is never typed: %s', (typed) => {
    expect(letterProblems(`It was ${typed}.`)).toHaveLength(1);
  });

  test('other numbers and the unit alone may be', () => {
    expect(
      letterProblems('Call us on 0555 0142 until 17:00 on 3 May. A decibel (dB) tells loudness.'),
    ).toEqual([]);
  });
});
