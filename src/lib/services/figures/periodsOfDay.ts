import { ldenDb, periodKindsOf, type PeriodKind, type PeriodScheme } from '#lib/acoustics/dayEveningNight';
import { type PooledPeriodsOfDay } from '#lib/contracts/figureSheet';
import { periodsTouching, settingsOfDate } from '../levels/datePeriods';
import { type Span } from '../levels/spans';
import { periodsBeginningIn } from '../strip/namedPeriods';
import { poolParts, type Part } from './pooled';
import { type SheetSource } from './source';

interface KindSpan extends Span {
  kind: PeriodKind;
  date: string;
}

const LABELS: Record<PeriodKind, string> = { day: 'Day', evening: 'Evening', night: 'Night' };

/** Days, evenings and nights of the period by the clock: what lies outside it is clipped off. */
export function periodsByClock(source: SheetSource): Promise<PooledPeriodsOfDay> {
  const { period, timeline } = source;
  const spans = periodsTouching(period.fromSec, period.toSec, timeline).map((one) => ({
    ...one,
    fromSec: Math.max(one.fromSec, period.fromSec),
    toSec: Math.min(one.toSec, period.toSec),
  }));
  return pooledOf(source, spans);
}

/** Days, evenings and nights that begin within the period, whole; null when none does. */
export async function periodsByDate(source: SheetSource): Promise<PooledPeriodsOfDay | null> {
  const spans = periodsBeginningIn(source.period, source.timeline);
  return spans.length === 0 ? null : pooledOf(source, spans);
}

async function pooledOf(source: SheetSource, spans: readonly KindSpan[]): Promise<PooledPeriodsOfDay> {
  const parts: (Part & { kind: PeriodKind })[] = [];
  for (const span of spans) {
    const levels = await source.series.levels(span);
    const expectedSec = Math.max(0, Math.min(span.toSec, source.nowSec) - span.fromSec);
    parts.push({ kind: span.kind, levels, expectedSec });
  }
  const kinds: readonly PeriodKind[] = ['day', 'evening', 'night'];
  const rows = kinds
    .filter((kind) => parts.some((part) => part.kind === kind))
    .map((kind) => ({
      kind,
      ...poolParts(
        LABELS[kind],
        parts.filter((part) => part.kind === kind),
        source.minimumCoverage,
      ),
    }));
  return { rows, ...ldenOf(rows, schemesOf(source, spans)) };
}

function schemesOf({ timeline }: SheetSource, spans: readonly KindSpan[]): PeriodScheme[] {
  const schemes = new Map<string, PeriodScheme>();
  for (const { date } of spans) {
    const { scheme } = settingsOfDate(date, timeline);
    schemes.set(`${scheme.dayStartMin} ${scheme.eveningStartMin} ${scheme.nightStartMin}`, scheme);
  }
  return [...schemes.values()];
}

function ldenOf(
  rows: PooledPeriodsOfDay['rows'],
  [scheme, ...others]: PeriodScheme[],
): Pick<PooledPeriodsOfDay, 'Lden' | 'missing'> {
  if (!scheme) return { Lden: null, missing: 'No day, evening or night lies in the period.' };
  if (others.length > 0) {
    return { Lden: null, missing: 'The hours of day, evening and night changed within the period.' };
  }
  const levelOf = (kind: PeriodKind) => rows.find((row) => row.kind === kind)?.LAeq ?? null;
  const Lden = ldenDb(scheme, { day: levelOf('day'), evening: levelOf('evening'), night: levelOf('night') });
  if (Lden !== null) return { Lden, missing: null };
  const lacking = periodKindsOf(scheme).filter((kind) => levelOf(kind) === null);
  return { Lden: null, missing: `There are no valid data of any ${lacking.join(' or ')} in it.` };
}
