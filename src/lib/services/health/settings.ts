import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listHealthSettings, setHealthSettings } from '#db/queries/healthSettings';
import { findStation, listStations } from '#db/queries/stations';
import { DEFAULT_THRESHOLDS, type HealthSettings, type Thresholds } from '#lib/contracts/health';
import { done, invalid, type Outcome } from '../outcome';

export interface NetworkHealthSettings {
  defaults: Thresholds;
  network: Thresholds;
  recipients: string[];
  /** Stations that have bounds of their own. */
  stations: { station: string; thresholds: Thresholds }[];
}

/** Bounds of a network and of its stations, beside those that hold otherwise. */
export async function healthSettings(networkId: number): Promise<NetworkHealthSettings> {
  const [rows, stations] = await Promise.all([listHealthSettings(networkId), listStations(networkId)]);
  const ofNetwork = rows.find(({ stationId }) => stationId === 0);
  return {
    defaults: DEFAULT_THRESHOLDS,
    network: ofNetwork?.thresholds ?? {},
    recipients: ofNetwork?.recipients ?? [],
    stations: stations.flatMap(({ id, code }) => {
      const thresholds = rows.find(({ stationId }) => stationId === id)?.thresholds ?? {};
      return Object.keys(thresholds).length === 0 ? [] : [{ station: code, thresholds }];
    }),
  };
}

/** Sets the bounds of a network, or of one of its stations, in the place of those set before. */
export async function changeHealthSettings(
  networkId: number,
  { station: code, thresholds, recipients }: HealthSettings,
  userId: string,
): Promise<Outcome<NetworkHealthSettings>> {
  const station = code === null ? null : await findStation(networkId, code);
  if (station === undefined) return invalid('station', 'is not a station of this network');
  const stationId = station?.id ?? 0;
  await inTransaction(async (transaction) => {
    const before = (await listHealthSettings(networkId, transaction)).find(
      (row) => row.stationId === stationId,
    );
    const after = { stationId, thresholds, recipients: station ? [] : recipients };
    await setHealthSettings(networkId, after, userId, transaction);
    await appendAudit(
      {
        userId,
        networkId,
        action: 'health-settings.change',
        subject: station ? `station ${station.code}` : `network ${networkId}`,
        detail: { before: before ?? null, after },
      },
      transaction,
    );
  });
  return done(await healthSettings(networkId));
}
