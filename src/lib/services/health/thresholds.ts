import { type HealthSettingsRow } from '#db/queries/healthSettings';
import { DEFAULT_THRESHOLDS, type FullThresholds } from '#lib/contracts/health';

/** The bounds of a station: its own before the network's before those that hold otherwise. */
export function thresholdsFor(stationId: number, settings: readonly HealthSettingsRow[]): FullThresholds {
  const of = (id: number) => settings.find((row) => row.stationId === id)?.thresholds ?? {};
  return { ...DEFAULT_THRESHOLDS, ...of(0), ...of(stationId) };
}
