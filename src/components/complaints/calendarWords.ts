import { formatLevelDb } from '#lib/format/levels';
import { formatLocalDate } from '#lib/format/times';
import { complaintsText } from './numberWords';

/** A date of the calendar as it is shown. */
export interface ShownDate {
  date: string;
  complaints: number;
  atNight: number;
  exceedances: number;
  night: { station: string; levelDb: number; coverage: number } | null;
}

/** The nights of dates with complaints against those of dates without, in a sentence or two. */
export function calendarSentence(dates: readonly ShownDate[], station: string | null): string {
  const total = dates.reduce((sum, { complaints }) => sum + complaints, 0);
  const most = dates.toSorted((a, b) => b.complaints - a.complaints)[0];
  const loudest = dates
    .filter(({ night }) => night !== null)
    .toSorted((a, b) => (b.night?.levelDb ?? 0) - (a.night?.levelDb ?? 0))[0];
  const counted =
    total === 0 || !most
      ? 'No complaint in this month.'
      : `${complaintsText(total)}, most on ${formatLocalDate(most.date)} (${most.complaints}).`;
  const where = station ?? loudest?.night?.station;
  const levels = loudest?.night
    ? ` The loudest night with enough data began on ${formatLocalDate(loudest.date)}: Lnight ${formatLevelDb(loudest.night.levelDb)} dB at ${where}.`
    : ' No night has enough data.';
  return counted + levels;
}
