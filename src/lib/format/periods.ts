import { clockChangesIn } from '#lib/time/clockChange';
import { type PresetName } from '#lib/time/periodSteps';
import { localDateAt } from '#lib/time/zone';
import { formatDuration } from './durations';
import { formatLocalDate, formatMonth, type Span } from './times';

/** Presets by their names in words; months by their own name. */
export function presetWords(name: PresetName, span: Span | null, zone: string): string {
  if (span && (name === 'this-month' || name === 'last-month')) {
    return formatMonth(localDateAt(span.fromSec, zone).slice(0, 7));
  }
  return {
    'last-24-h': 'Last 24 h',
    today: 'Today',
    yesterday: 'Yesterday',
    'this-week': 'This week',
    'this-month': 'This month',
    'last-month': 'Last month',
  }[name];
}

/**
 * What a clock change within a period means for it, or null: "Clock change on Sun 29 March 2026: 23 h that day" and, for a
 * period of up to two days, how long it really is.
 */
export function clockChangeWords({ fromSec, toSec }: Span, zone: string): string | null {
  const [change] = clockChangesIn(fromSec, toSec, zone);
  if (!change) return null;
  const words = `Clock change on ${formatLocalDate(change.date)}: that day has ${change.hours} h`;
  const isShort = toSec - fromSec <= 2 * 86_400;
  return isShort ? `${words}, this period ${formatDuration(toSec - fromSec)}` : words;
}
