/** A stretch without data at a station, in hours before the demo was made; `isBackfilled`: brought in later from the card. */
export interface Outage {
  code: string;
  fromHoursAgo: number;
  toHoursAgo: number;
  isBackfilled: boolean;
}

const OUTAGES: Outage[] = [
  { code: 'MER-05', fromHoursAgo: 33, toHoursAgo: 24.4, isBackfilled: false },
  { code: 'MER-05', fromHoursAgo: 611, toHoursAgo: 585, isBackfilled: false },
  { code: 'MER-03', fromHoursAgo: 92, toHoursAgo: 79, isBackfilled: true },
  { code: 'MER-02', fromHoursAgo: 250.5, toHoursAgo: 248, isBackfilled: false },
  { code: 'MER-06', fromHoursAgo: 1203, toHoursAgo: 1180, isBackfilled: false },
  { code: 'MER-07', fromHoursAgo: 400, toHoursAgo: 363, isBackfilled: false },
  { code: 'MER-01', fromHoursAgo: 905, toHoursAgo: 903.5, isBackfilled: false },
];

/** Whether a station lacks the interval that starts `hoursAgo` hours before the demo was made. */
export function isInOutage(code: string, hoursAgo: number, isBackfilled: boolean): boolean {
  return OUTAGES.some(
    (outage) =>
      outage.code === code &&
      outage.isBackfilled === isBackfilled &&
      hoursAgo <= outage.fromHoursAgo &&
      hoursAgo > outage.toHoursAgo,
  );
}
