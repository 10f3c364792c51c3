import { z } from 'zod';
import { formatInstantUtc, localDate } from '#lib/contracts/common';
import { MOST_SEARCHED_DAYS, spectrumSearchOptionsSchema } from '#lib/contracts/spectrumSearch';
import { type FormValues } from '#lib/http/forms';
import { type SpectrumSearch } from '#lib/services/spectra/search';
import { addDays, isLocalDate, localDateAt, startOfDaySec } from '#lib/time/zone';

const datesSchema = z
  .object({ since: localDate, until: localDate })
  .superRefine(({ since, until }, context) => {
    if (!isLocalDate(since) || !isLocalDate(until)) return;
    const message =
      until < since
        ? 'must not be before the first date'
        : until >= addDays(since, MOST_SEARCHED_DAYS)
          ? 'must be at most ten years from the first'
          : null;
    if (message) context.addIssue({ code: 'custom', path: ['until'], message });
  });

/** What stands in the form at first: the year up to today, three decibels, however loud. */
export function firstSearchValues(nowSec: number, zone: string): Record<string, string> {
  const until = localDateAt(nowSec, zone);
  return { since: addDays(until, -365), until, likeness: '3', gap: '5', order: 'likeness' };
}

interface Setting {
  station: SpectrumSearch['station'];
  period: { fromSec: number; toSec: number };
  zone: string;
  nowSec: number;
}

/** The search that the form asks for. @throws {ZodError} by the form's fields. */
export function searchOfForm({ text, all }: FormValues, setting: Setting): SpectrumSearch {
  const { station, period, zone, nowSec } = setting;
  const typed = Object.fromEntries(
    Object.entries(text).flatMap(([name, value]) => (value === '' ? [] : [[name, value.replace(',', '.')]])),
  );
  const parsed = datesSchema.and(spectrumSearchOptionsSchema).parse({ ...datesOf(text), ...typed });
  const { since, until, ...options } = parsed;
  const searched = { fromSec: startOfDaySec(since, zone), toSec: startOfDaySec(addDays(until, 1), zone) };
  return { station, period, searched, codes: all('stations'), options, nowSec };
}

function datesOf(text: FormValues['text']): { since: string; until: string } {
  return { since: text['since'] ?? '', until: text['until'] ?? '' };
}

/** Query of the same search for the interface, which gives it as a file. */
export function interfaceQuery({ station, period, searched, codes, options }: SpectrumSearch): string {
  const query = new URLSearchParams({
    station: station.code,
    from: formatInstantUtc(period.fromSec),
    to: formatInstantUtc(period.toSec),
    since: formatInstantUtc(searched.fromSec),
    until: formatInstantUtc(searched.toSec),
    ...(codes.length > 0 && { stations: codes.join(',') }),
  });
  for (const [name, value] of Object.entries(options)) {
    if (value !== undefined) query.set(name, String(value));
  }
  return query.toString();
}
