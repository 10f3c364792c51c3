import { type NetworkSettings } from '#db/queries/networks';
import { formatClockTime, formatInstantUtc } from '#lib/contracts/common';
import { type Convention } from '#lib/contracts/summaries';
import { type MonthSpan } from '../monthSpan';

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
