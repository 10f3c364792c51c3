import { typedNumber, type FormValues } from '#lib/http/forms';
import { invalidFields } from '#lib/http/problem';
import { type Mast } from '#lib/contracts/weather';
import { parseUrlInstant } from '#lib/time/urlPeriod';
import { formatInstantUtc } from '#lib/contracts/common';

/** What a mast's form says of it, as the contract takes it. */
export function typedFacts({ text }: FormValues) {
  return {
    name: text['name'] ?? '',
    latitude: typedNumber(text['latitude']),
    longitude: typedNumber(text['longitude']),
    height: typedNumber(text['height']),
    maximumAge: typedNumber(text['maximumAge']),
  };
}

/** A mast as its form shows it. */
export function factsAsTyped(mast: Mast): Record<string, string> {
  const { name, latitude, longitude, height, maximumAge } = mast;
  return {
    name,
    latitude: String(latitude),
    longitude: String(longitude),
    height: String(height),
    maximumAge: String(maximumAge),
  };
}

/** A local date and time of a form as the contract takes it; undefined for an empty field. */
export function typedInstant({ text }: FormValues, field: string, zone: string): string | undefined {
  const typed = text[field] ?? '';
  if (typed === '') return undefined;
  const sec = parseUrlInstant(typed, zone);
  if (sec === null) {
    throw invalidFields([{ field, message: 'must be a date and time such as 2026-03-17T14:30' }]);
  }
  return formatInstantUtc(sec);
}
