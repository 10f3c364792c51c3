import { energyOfDb, levelOfEnergyDb } from './energy';

/** A part of the civil day that has a level and a penalty of its own. */
export type PeriodKind = 'day' | 'evening' | 'night';

/** When a network's periods begin, in minutes after local midnight, ascending. The night lasts until the next day's start. */
export interface PeriodScheme {
  dayStartMin: number;
  /** Null where the scheme has no evening: the day then lasts until the night. */
  eveningStartMin: number | null;
  nightStartMin: number;
}

/** A level in dB for each period of a day; null where nothing was valid. */
export type PeriodLevelsDb = Record<PeriodKind, number | null>;

/** Penalties in dB, Directive 2002/49/EC Annex I. */
export const PENALTY_DB: Readonly<Record<PeriodKind, number>> = { day: 0, evening: 5, night: 10 };

const DAY_MIN = 1440;

/** The Directive's default: day 07–19, evening 19–23, night 23–07. */
export const DEFAULT_SCHEME: PeriodScheme = { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 };
/** Ldn: day 07–22 (15 h), night 22–07 (9 h). */
export const LDN_SCHEME: PeriodScheme = { dayStartMin: 420, eveningStartMin: null, nightStartMin: 1320 };
/** CNEL: day 07–19 (12 h), evening 19–22 (3 h), night 22–07 (9 h). */
export const CNEL_SCHEME: PeriodScheme = { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1320 };

/** What is wrong with a scheme, in words, or null when its periods are whole minutes that tile the day in order. */
export function schemeProblem(scheme: PeriodScheme): string | null {
  const starts = [scheme.dayStartMin, scheme.eveningStartMin, scheme.nightStartMin].filter(
    (start) => start !== null,
  );
  if (!starts.every((start) => Number.isInteger(start) && start >= 0 && start < DAY_MIN)) {
    return 'A period must begin on a whole minute from 00:00 to 23:59.';
  }
  const ascending = starts.every((start, i) => i === 0 || start > (starts[i - 1] ?? start));
  return ascending ? null : 'Day, evening and night must begin in this order within one date.';
}

/** Kinds of a scheme's periods in order of time. */
export function periodKindsOf(scheme: PeriodScheme): PeriodKind[] {
  return scheme.eveningStartMin === null ? ['day', 'night'] : ['day', 'evening', 'night'];
}

/** Nominal hours of each period: what Lden is weighted by even on the days of a clock change. */
export function nominalHoursOf(scheme: PeriodScheme): Record<PeriodKind, number> {
  const { dayStartMin, nightStartMin } = scheme;
  const eveningStartMin = scheme.eveningStartMin ?? nightStartMin;
  return {
    day: (eveningStartMin - dayStartMin) / 60,
    evening: (nightStartMin - eveningStartMin) / 60,
    night: (dayStartMin + DAY_MIN - nightStartMin) / 60,
  };
}

/**
 * Lden in dB: 10 lg{[t_d·10^(Ld/10) + t_e·10^((Le+5)/10) + t_n·10^((Ln+10)/10)]/24}, Directive 2002/49/EC Annex I, with the
 * scheme's nominal hours. Null when a period of the scheme has no level. For a month or a year give levels pooled over
 * all its days, evenings and nights.
 */
export function ldenDb(scheme: PeriodScheme, levelsDb: PeriodLevelsDb): number | null {
  const hours = nominalHoursOf(scheme);
  let energyHours = 0;
  for (const kind of periodKindsOf(scheme)) {
    const levelDb = levelsDb[kind];
    if (levelDb === null) return null;
    energyHours += hours[kind] * energyOfDb(levelDb + PENALTY_DB[kind]);
  }
  return levelOfEnergyDb(energyHours / 24);
}

/** Ldn in dB from the levels of 07–22 and 22–07 (15 h, and 9 h with 10 dB added); null when either is missing. */
export function ldnDb(levelsDb: { day: number | null; night: number | null }): number | null {
  return ldenDb(LDN_SCHEME, { ...levelsDb, evening: null });
}

/**
 * CNEL in dB from the levels of 07–19, 19–22 and 22–07 (12, 3 and 9 h, 5 and 10 dB added); null when one is missing.
 * By definition over one calendar day, so its night is the two part nights of that date (ASA term 3.20).
 */
export function cnelDb(levelsDb: PeriodLevelsDb): number | null {
  return ldenDb(CNEL_SCHEME, levelsDb);
}
