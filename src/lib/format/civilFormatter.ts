const STYLES = {
  clock: { hour: '2-digit', minute: '2-digit', hourCycle: 'h23' },
  clockSeconds: { hour: '2-digit', minute: '2-digit', second: '2-digit', hourCycle: 'h23' },
  date: { weekday: 'short', day: 'numeric', month: 'long', year: 'numeric' },
  dayMonth: { day: 'numeric', month: 'short' },
  month: { month: 'long', year: 'numeric' },
} as const satisfies Record<string, Intl.DateTimeFormatOptions>;

const made = new Map<string, Intl.DateTimeFormat>();

/** A formatter of British English in a zone. Making one costs a millisecond, so that each is made once. */
export function civilFormatter(style: keyof typeof STYLES, zone: string): Intl.DateTimeFormat {
  const key = `${style} ${zone}`;
  const formatter = made.get(key) ?? new Intl.DateTimeFormat('en-GB', { ...STYLES[style], timeZone: zone });
  made.set(key, formatter);
  return formatter;
}
