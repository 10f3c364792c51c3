import { energyOfDb } from '#lib/acoustics/energy';
import {
  nominalHoursOf,
  PENALTY_DB,
  periodKindsOf,
  type PeriodKind,
  type PeriodScheme,
} from '#lib/acoustics/dayEveningNight';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { coverageUncertaintyDb, periodUncertainty } from '#lib/acoustics/uncertainty';
import { type Uncertainties } from '#lib/contracts/monthFigures';
import { type PeriodInstruments } from '../../figures/instruments';
import { type Span } from '../../levels/spans';

/** An hour with the energy that was measured in it; one without a valid second has no part in what gaps bring in. */
export interface HourEnergy {
  fromSec: number;
  levels: { sums: Pick<PeriodSums, 'validSec' | 'aEnergySec'> };
}

/** A level with the stretches of time that it is taken over. */
export interface CoveredLevel {
  levelDb: number | null;
  coverage: number;
  /** Ascending. */
  spans: readonly Span[];
}

/** What uncertainties rest on. */
export interface UncertaintyGround {
  /** Ascending; those of other stretches of time are left aside. */
  hours: readonly HourEnergy[];
  instruments: Pick<PeriodInstruments, 'uncertaintyDb' | 'drift'>;
}

/** A level with what its gaps bring into it. */
export interface GappedLevel {
  levelDb: number | null;
  /** Standard uncertainty by gaps, dB; null where it cannot be told. */
  gapsDb: number | null;
}

/** Standard uncertainty that gaps bring into a level of some stretches of time, by the energies of their hours. */
export function gapsOf(
  hours: readonly HourEnergy[],
  spans: readonly Span[],
  coverage: number,
): number | null {
  if (coverage === 1) return 0;
  const energies = hoursWithin(hours, spans)
    .filter(({ levels }) => levels.sums.validSec > 0)
    .map(({ levels }) => levels.sums.aEnergySec / levels.sums.validSec);
  return energies.length === 0 ? null : coverageUncertaintyDb(energies, coverage);
}

/** Expanded uncertainty U = 2u of a level in dB; null without a level, or where the part of its gaps cannot be told. */
export function expandedDb(
  { levelDb, gapsDb }: GappedLevel,
  { uncertaintyDb, drift }: Pick<PeriodInstruments, 'uncertaintyDb' | 'drift'>,
): number | null {
  if (levelDb === null) return null;
  const terms = { instrumentDb: uncertaintyDb, driftDb: drift.driftDb, coverageDb: gapsDb };
  return periodUncertainty(terms)?.expandedDb ?? null;
}

/** Expanded uncertainties of the levels of some time, by its scheme of day, evening and night. */
export function uncertaintiesOf(
  scheme: PeriodScheme,
  {
    clock,
    kinds,
    ldenDb,
  }: { clock: CoveredLevel; kinds: Record<PeriodKind, CoveredLevel>; ldenDb: number | null },
  { hours, instruments }: UncertaintyGround,
): Uncertainties {
  const gapped = ({ levelDb, coverage, spans }: CoveredLevel): GappedLevel => ({
    levelDb,
    gapsDb: levelDb === null ? null : gapsOf(hours, spans, coverage),
  });
  const of = { day: gapped(kinds.day), evening: gapped(kinds.evening), night: gapped(kinds.night) };
  const lden = { levelDb: ldenDb, gapsDb: ldenDb === null ? null : ldenGaps(scheme, of) };
  return {
    LAeq: expandedDb(gapped(clock), instruments),
    Lday: expandedDb(of.day, instruments),
    Levening: expandedDb(of.evening, instruments),
    Lnight: expandedDb(of.night, instruments),
    Lden: expandedDb(lden, instruments),
  };
}

/**
 * What gaps bring into Lden: those of its periods, each weighted by the period’s share of the energy that Lden is made of. The
 * gaps of day, evening and night are taken as independent.
 */
function ldenGaps(scheme: PeriodScheme, levels: Readonly<Record<PeriodKind, GappedLevel>>): number | null {
  const hours = nominalHoursOf(scheme);
  const parts: { energy: number; gapsDb: number }[] = [];
  for (const kind of periodKindsOf(scheme)) {
    const { levelDb, gapsDb } = levels[kind];
    if (levelDb === null || gapsDb === null) return null;
    parts.push({ energy: hours[kind] * energyOfDb(levelDb + PENALTY_DB[kind]), gapsDb });
  }
  const total = parts.reduce((sum, { energy }) => sum + energy, 0);
  return Math.hypot(...parts.map(({ energy, gapsDb }) => (energy / total) * gapsDb));
}

/** Hours that begin within some ascending stretches. */
function hoursWithin(hours: readonly HourEnergy[], spans: readonly Span[]): HourEnergy[] {
  let at = 0;
  return hours.filter(({ fromSec }) => {
    while ((spans[at]?.toSec ?? Infinity) <= fromSec) at += 1;
    return (spans[at]?.fromSec ?? Infinity) <= fromSec;
  });
}
