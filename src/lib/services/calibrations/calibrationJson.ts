import { type CalibrationRow } from '#db/queries/calibrations';
import { type CalibrationSettings } from '#db/queries/calibrationSettings';
import { centiDbToDb } from '#lib/acoustics/rounding';
import { type Calibration, type CalibrationSettingsJson } from '#lib/contracts/calibrations';
import { formatInstantUtc } from '#lib/contracts/common';

type Levels = Pick<
  CalibrationRow,
  'calibratorCentiDb' | 'beforeCentiDb' | 'afterCentiDb' | 'driftBoundCentiDb'
>;

/** How far the instrument was off before any adjustment, in hundredths of a dB. */
export function driftCentiDb({ beforeCentiDb, calibratorCentiDb }: Levels): number {
  return beforeCentiDb - calibratorCentiDb;
}

/** Whether the drift found is within the bound, and whether the instrument went on within it. */
export function goodness(levels: Levels): { isGoodBefore: boolean; isGoodAfter: boolean } {
  const isGood = (shownCentiDb: number) =>
    Math.abs(shownCentiDb - levels.calibratorCentiDb) <= levels.driftBoundCentiDb;
  return {
    isGoodBefore: isGood(levels.beforeCentiDb),
    isGoodAfter: isGood(levels.afterCentiDb ?? levels.beforeCentiDb),
  };
}

/** A check as the interface gives it. */
export function calibrationJson(row: CalibrationRow): Calibration {
  const { certificateType, certificateBytes, certificateSha256 } = row;
  return {
    id: row.id,
    instrument: row.instrumentId,
    serialNumber: row.serialNumber,
    station: row.stationCode,
    checkedAt: formatInstantUtc(row.checkedAtSec),
    calibrator: row.calibrator,
    calibratorLevel: centiDbToDb(row.calibratorCentiDb),
    before: centiDbToDb(row.beforeCentiDb),
    after: row.afterCentiDb === null ? null : centiDbToDb(row.afterCentiDb),
    drift: centiDbToDb(driftCentiDb(row)),
    driftBound: centiDbToDb(row.driftBoundCentiDb),
    isWithinBound: goodness(row).isGoodBefore,
    checkedBy: row.checkedBy,
    note: row.note,
    certificate:
      certificateType === null || certificateSha256 === null
        ? null
        : { type: certificateType, bytes: certificateBytes ?? 0, sha256: certificateSha256.toString('hex') },
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    withdrawal: row.withdrawnAt && {
      at: row.withdrawnAt.toISOString(),
      by: row.withdrawnByName,
      reason: row.withdrawalReason ?? '',
    },
  };
}

/** How a network checks its instruments, as the interface gives it. */
export function settingsJson(settings: CalibrationSettings): CalibrationSettingsJson {
  const { driftBoundCentiDb, ...others } = settings;
  return { driftBound: centiDbToDb(driftBoundCentiDb), ...others };
}
