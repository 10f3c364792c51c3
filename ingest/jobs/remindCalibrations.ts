import { remindCalibrations } from '#ingest/health/remindCalibrations';

/** Puts reminders of calibration checks that fall due into the outbox, each once. */
export async function remindOfCalibrations(now: Date): Promise<string> {
  return `${await remindCalibrations(now)} reminders`;
}
