import { localDateAt, localMinuteAt } from '#lib/time/zone';

/** The local minute of an instant as a `datetime-local` input takes it: `2026-03-17T12:00`. */
export function localMinute(sec: number, zone: string): string {
  const minutes = localMinuteAt(sec, zone);
  const pad = (value: number) => String(value).padStart(2, '0');
  return `${localDateAt(sec, zone)}T${pad(Math.floor(minutes / 60))}:${pad(minutes % 60)}`;
}
