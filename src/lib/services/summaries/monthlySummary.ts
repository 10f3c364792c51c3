import { countOfWindowsWithin } from '#db/queries/complaints';
import { listExceedancesBeginning } from '#db/queries/exceedanceRecords';
import { listSettings, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { listStations } from '#db/queries/stations';
import { formatClockTime, formatInstantUtc } from '#lib/contracts/common';
import { summarySchema, type Convention, type Summary } from '#lib/contracts/summaries';
import { monthSpan, stoodWithin, type MonthSpan } from './monthSpan';
import { stationSummary } from './stationSummary';

/**
 * The month of a network: every figure of its summary, current as of `now`. The one computation behind page, PDF, CSV and JSON.
 * Null for a month that has not begun. Stations that stood in the month are listed even without data: missing is told.
 */
export async function monthlySummary(network: NetworkRow, month: string, now: Date): Promise<Summary | null> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const timeline = await listSettings(network.id);
  const span = monthSpan(month, timeline);
  if (nowSec <= span.fromSec) return null;
  const [stations, exceedances, complaints] = await Promise.all([
    listStations(network.id),
    listExceedancesBeginning(network.id, span.fromSec, span.toSec),
    countOfWindowsWithin(network.id, span.fromSec, span.toSec),
  ]);
  const found = [];
  for (const station of stations) {
    const own = exceedances.filter(({ stationId }) => stationId === station.id);
    const summary = await stationSummary({ station, span, timeline, exceedances: own, nowSec });
    if (stoodWithin(station, span) || summary.figures.LAeq !== null) found.push(summary);
  }
  return summarySchema.parse({
    network: { slug: network.slug, name: network.name },
    month,
    status: 'draft',
    timeZone: span.timeZone,
    from: formatInstantUtc(span.fromSec),
    to: formatInstantUtc(span.toSec),
    isToDate: nowSec < span.lastNightEndSec,
    generatedAt: now.toISOString(),
    conventions: conventionsOf(timeline, span),
    complaints,
    stations: found,
  } satisfies Summary);
}

/** Settings of the network that hold at some time of a month, in order of time. */
export function conventionsOf(timeline: NetworkSettings[], { fromSec, toSec }: MonthSpan): Convention[] {
  const changes = timeline.filter((settings) => settings.effectiveFromSec < toSec);
  const first = Math.max(
    0,
    changes.findLastIndex((settings) => settings.effectiveFromSec <= fromSec),
  );
  const inForce = changes.length === 0 ? timeline.slice(0, 1) : changes.slice(first);
  return inForce.map((settings, at) => ({
    from: at === 0 ? null : formatInstantUtc(settings.effectiveFromSec),
    timeZone: settings.timeZone,
    day: formatClockTime(settings.scheme.dayStartMin),
    evening:
      settings.scheme.eveningStartMin === null ? null : formatClockTime(settings.scheme.eveningStartMin),
    night: formatClockTime(settings.scheme.nightStartMin),
    minimumCoverage: settings.minimumCoverage,
    maximumWindSpeed: settings.rules.maximumWindSpeedMs,
    excludeRain: settings.rules.excludeRain,
  }));
}
