import { describe, expect, test } from 'vitest';
import { guessTarget, guessTargets } from '#ingest/imports/guessTarget';
import { sniff } from '#ingest/imports/sniff';

const STATION = { zone: 'Europe/London', intervalSec: 60 };
const sniffText = (text: string, shape = {}) => sniff(Buffer.from(text), { ...STATION, shape });

describe('a heading', () => {
  test.each([
    ['LAeq', 'LAeq'],
    ['Leq(A) [dB]', 'LAeq'],
    ['LAF max', 'LAFmax'],
    ['Wind speed (m/s)', 'windSpeed'],
    ['Timestamp', 'start'],
    ['63', '63'],
    ['31,5 Hz', '31.5'],
    ['1 kHz', '1000'],
    ['LZeq 3.15k', '3150'],
    ['Leq_125Hz', '125'],
    // Band levels are unweighted: a weighted one is not offered.
    ['LAeq 63 Hz', null],
    ['64 Hz', null],
    ['Comment', null],
    ['', null],
  ])('%s is %s', (heading, target) => {
    expect(guessTarget(heading)).toBe(target);
  });

  test('gives its target once, and a time without a date is the start', () => {
    expect(guessTargets(['Date', 'Time', 'LAeq', 'LAeq'])).toEqual(['date', 'time', 'LAeq', null]);
    expect(guessTargets(['Time', 'LAeq'])).toEqual(['start', 'LAeq']);
    expect(guessTargets(['Start', 'Time', '63'])).toEqual(['start', null, '63']);
  });
});

describe('the beginning of a file', () => {
  test('in the contract’s own columns needs no guess', () => {
    const head = sniffText(
      '\ufeffstart,seconds,LAeq,LAFmax,LAFmin,LCeq,LCpeak,63,125,flags,windSpeed,windDirection,temperature,battery\r\n' +
        '2026-03-01T00:00:00Z,60,50,,,,,48,,,,,,\r\n',
    );
    expect(head).toMatchObject({ isOwn: true, guess: { zone: 'UTC', seconds: null, decimal: '.' } });
  });

  test('shows what separates the columns, where the headings are, decimal commas and the order of dates', () => {
    const head = sniffText(
      'Logger;17\r\nSite;Quay\r\n\r\nDate;Time;LAeq;63 Hz\r\n25.10.2025;01:00;51,2;48,3\r\n',
    );
    expect(head.guess).toEqual({
      delimiter: ';',
      decimal: ',',
      headerLine: 4,
      columns: ['date', 'time', 'LAeq', '63'],
      dateOrder: 'dmy',
      zone: 'Europe/London',
      marks: 'start',
      seconds: 60,
    });
    expect(head.rows).toEqual([['25.10.2025', '01:00', '51,2', '48,3']]);
  });

  test('with as many decimal commas as columns is still split at its semicolons', () => {
    const head = sniffText(`Time;LAeq;63;125\n${'2026-03-01 00:00;51,2;48,3;47,1\n'.repeat(9)}`);
    expect(head.guess).toMatchObject({
      delimiter: ';',
      decimal: ',',
      columns: ['start', 'LAeq', '63', '125'],
    });
  });

  test('is read as a person says where the guess is wrong', () => {
    const head = sniffText('a b;c,d\n1;2,3\n', { delimiter: ';', headerLine: 1 });
    expect(head.headings).toEqual(['a b', 'c,d']);
  });

  test('takes dates with a second number above 12 for month, day, year', () => {
    expect(sniffText('Time,LAeq\n03/29/2026 01:00,50\n').guess.dateOrder).toBe('mdy');
    expect(sniffText('Time,LAeq\n2026-03-29 01:00,50\n').guess.dateOrder).toBe('ymd');
  });

  test.each([
    ['nothing', Buffer.alloc(0), /empty/],
    ['a packed file', Buffer.from([0x1f, 0x8b, 8, 0]), /unpack/],
    ['UTF-16', Buffer.from('a,b', 'utf16le'), /UTF-8/],
    ['prose', Buffer.from('It was a quiet night.\nNothing was heard.\n'), /not CSV/],
  ])('of %s is refused in words', (_, head, words) => {
    expect(() => sniff(head, STATION)).toThrow(words);
  });
});
