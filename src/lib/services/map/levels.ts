import { selectExceededSpans } from '#db/queries/mapLayers';
import { listSettings, pickSettings } from '#db/queries/networks';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { formatInstantUtc } from '#lib/contracts/common';
import { type NetworkLevels } from '#lib/contracts/networkMap';
import { networkQuarters } from '#lib/services/levels/networkQuarters';
import { type Span } from '#lib/services/levels/spans';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';

/** The stations of a network, retired ones too, quarter-hour by quarter-hour of a period, widened to whole ones. */
export async function networkLevels(networkId: number, { fromSec, toSec }: Span): Promise<NetworkLevels> {
  const span = { fromSec: quarterAt(fromSec), toSec: quarterAt(toSec + QUARTER_SEC - 1) };
  const [quarters, exceeded, timeline] = await Promise.all([
    networkQuarters(networkId, span),
    selectExceededSpans(networkId, span.fromSec, span.toSec),
    listSettings(networkId),
  ]);
  return {
    from: formatInstantUtc(span.fromSec),
    to: formatInstantUtc(span.toSec),
    stepSeconds: QUARTER_SEC,
    minimumCoverage: pickSettings(timeline, span.fromSec).minimumCoverage,
    stations: quarters.map(({ station, laeqCentiDb, validSec }) => ({
      station: station.code,
      LAeq: laeqCentiDb.map((level) => (level === NO_LEVEL_CENTI_DB ? null : level / 100)),
      validSeconds: validSec,
      exceeded: exceeded
        .filter(({ stationId }) => stationId === station.id)
        .map((window) => ({ from: formatInstantUtc(window.fromSec), to: formatInstantUtc(window.toSec) })),
    })),
  };
}
