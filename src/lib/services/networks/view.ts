import { type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { formatClockTime, formatInstantUtc } from '#lib/contracts/common';
import { type Network } from '#lib/contracts/networks';

/** A network as the interface answers it. */
export function networkView(network: NetworkRow, settings: NetworkSettings): Network {
  const { dayStartMin, eveningStartMin, nightStartMin } = settings.scheme;
  return {
    slug: network.slug,
    name: network.name,
    timeZone: settings.timeZone,
    periods: {
      day: formatClockTime(dayStartMin),
      evening: eveningStartMin === null ? null : formatClockTime(eveningStartMin),
      night: formatClockTime(nightStartMin),
    },
    minimumCoverage: settings.minimumCoverage,
    maximumWindSpeed: settings.rules.maximumWindSpeedMs,
    excludeRain: settings.rules.excludeRain,
    settingsSince: settings.effectiveFromSec === 0 ? null : formatInstantUtc(settings.effectiveFromSec),
  };
}
