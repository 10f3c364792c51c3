import { expect, test } from 'vitest';
import { dueCalendar } from '#lib/services/calibrations/calendar';
import { certificateTypeOf } from '#lib/services/calibrations/certificate';
import { dueState } from '#lib/services/calibrations/due';

test('a calendar has folded, escaped lines that end in CRLF, and one event an instrument', () => {
  const text = dueCalendar(
    [
      {
        instrument: 7,
        serialNumber: `A;B,${'ü'.repeat(60)}`,
        station: 'MER-04',
        lastCheckedAt: null,
        dueOn: '2026-12-31',
        state: 'fine',
      },
    ],
    {
      networkName: 'Merrow',
      instrumentsUrl: 'https://bittern.merrow.example/n/merrow/instruments',
      host: 'bittern.merrow.example',
      now: new Date('2026-03-01T12:00:00Z'),
    },
  );
  const lines = text.split('\r\n');
  expect(lines.every((line) => Buffer.byteLength(line) <= 75 && !line.includes('\n'))).toBe(true);
  const unfolded = text.replaceAll('\r\n ', '');
  expect(unfolded).toContain(`SUMMARY:Calibration check of A\\;B\\,${'ü'.repeat(60)}\\, station MER-04\r\n`);
  expect(unfolded).toContain('DTSTART;VALUE=DATE:20261231\r\nDTEND;VALUE=DATE:20270101\r\n');
  expect(unfolded.match(/BEGIN:VEVENT/g)).toHaveLength(1);
});

test('a check is due soon so many days before, and overdue the day after', () => {
  const states = ['2026-03-15', '2026-03-16', '2026-03-30', '2026-03-31'].map((today) =>
    dueState('2026-03-30', today, 14),
  );
  expect(states).toEqual(['fine', 'soon', 'soon', 'overdue']);
});

test('a certificate is what its first bytes say', () => {
  const typeOf = (text: string) => certificateTypeOf(Buffer.from(text, 'latin1'));
  expect(typeOf('%PDF-1.7 …')).toBe('application/pdf');
  expect(typeOf('\x89PNG\r\n\x1a\n…')).toBe('image/png');
  expect(typeOf('\xff\xd8\xff\xe0…')).toBe('image/jpeg');
  for (const other of ['', '%PD', '<svg onload=alert(1)>', 'MZ%PDF-', 'GIF89a', '\x89PNG']) {
    expect(typeOf(other), other).toBeNull();
  }
});
