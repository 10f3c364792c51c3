import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { markNetworkFrom } from '#db/queries/dirtyMarks';
import {
  insertSettings,
  renameNetwork,
  settingsAt,
  type NetworkRow,
  type NetworkSettings,
} from '#db/queries/networks';
import { latestSeal } from '#db/queries/retention';
import { type NetworkChanges } from '#lib/contracts/networks';
import { refuseBefore } from '../retention/seal';

/**
 * Renames a network and gives it new settings from `effectiveFrom` (now, if left out) on. Earlier settings keep their time.
 * Settings that reach back have what was computed since recomputed.
 * @throws {SealedError} for settings that reach back to sealed time.
 */
export function changeNetwork(
  network: NetworkRow,
  changes: NetworkChanges,
  userId: string,
): Promise<NetworkRow> {
  const nowSec = Math.floor(Date.now() / 1000);
  const fromSec = changes.effectiveFrom ?? nowSec;
  const name = changes.name ?? network.name;
  return inTransaction(async (transaction) => {
    const before = await settingsAt(network.id, fromSec, transaction);
    const after = { ...merged(before, changes), effectiveFromSec: fromSec };
    const hasNewSettings = !isSame(before, after);
    if (name !== network.name) await renameNetwork(network.id, name, transaction);
    if (hasNewSettings) {
      refuseBefore(fromSec, (await latestSeal(network.id, transaction))?.sealedBeforeSec ?? 0);
      await insertSettings(network.id, after, userId, transaction);
      if (fromSec < nowSec) await markNetworkFrom(network.id, fromSec, transaction);
    }
    if (hasNewSettings || name !== network.name) {
      const detail = {
        before: { name: network.name, ...(hasNewSettings && { settings: before }) },
        after: { name, ...(hasNewSettings && { settings: after }) },
      };
      const subject = `network ${network.slug}`;
      await appendAudit(
        { userId, networkId: network.id, action: 'network.change', subject, detail },
        transaction,
      );
    }
    return { ...network, name };
  });
}

function merged(settings: NetworkSettings, changes: NetworkChanges): NetworkSettings {
  const { periods } = changes;
  return {
    effectiveFromSec: settings.effectiveFromSec,
    timeZone: changes.timeZone ?? settings.timeZone,
    scheme: periods
      ? { dayStartMin: periods.day, eveningStartMin: periods.evening, nightStartMin: periods.night }
      : settings.scheme,
    minimumCoverage: changes.minimumCoverage ?? settings.minimumCoverage,
    rules: {
      maximumWindSpeedMs: changes.maximumWindSpeed ?? settings.rules.maximumWindSpeedMs,
      excludeRain: changes.excludeRain ?? settings.rules.excludeRain,
    },
  };
}

function isSame(one: NetworkSettings, other: NetworkSettings): boolean {
  const content = ({ timeZone, scheme, minimumCoverage, rules }: NetworkSettings) =>
    JSON.stringify([
      timeZone,
      scheme.dayStartMin,
      scheme.eveningStartMin,
      scheme.nightStartMin,
      minimumCoverage,
      rules.maximumWindSpeedMs,
      rules.excludeRain,
    ]);
  return content(one) === content(other);
}
