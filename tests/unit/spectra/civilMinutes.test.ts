import { expect, test } from 'vitest';
import { CivilMinutes } from '#lib/services/spectra/civilMinutes';
import { localDateAt, localMinuteAt, weekdayOf } from '#lib/time/zone';

test('clocks are those of the zone, over its changes and on days without', () => {
  for (const zone of ['Europe/London', 'Asia/Kolkata', 'Australia/Lord_Howe', 'America/St_Johns']) {
    const civil = new CivilMinutes(zone);
    for (const from of ['2026-03-28T00:00:00Z', '2026-04-04T00:00:00Z', '2026-10-24T00:00:00Z']) {
      const fromSec = Date.parse(from) / 1000;
      for (let sec = fromSec; sec < fromSec + 2 * 86_400; sec += 420) {
        const weekday = weekdayOf(localDateAt(sec, zone));
        expect(civil.at(sec), `${zone} ${sec}`).toBe(weekday * 1440 + localMinuteAt(sec, zone));
      }
    }
  }
});
