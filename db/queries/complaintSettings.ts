import { DEFAULT_DESK_SETTINGS, type DeskSettings } from '#lib/contracts/complaintDesk';
import { pool, type Connection } from './connection';

/** How a network's desk works; what was never set up is as `DEFAULT_DESK_SETTINGS`. */
export async function readDeskSettings(networkId: number, conn: Connection = pool()): Promise<DeskSettings> {
  const row = await conn('complaint_settings').where({ network_id: networkId }).first();
  if (!row) return DEFAULT_DESK_SETTINGS;
  return {
    answerDays: row.answer_days,
    workingWeekdays: row.working_weekdays,
    remindDays: row.remind_days,
    retentionMonths: row.retention_months,
    placeStepHundredths: row.place_step_hundredths,
  };
}

export async function writeDeskSettings(
  networkId: number,
  settings: DeskSettings,
  changedBy: string,
  conn: Connection,
): Promise<void> {
  await conn('complaint_settings')
    .insert({
      network_id: networkId,
      answer_days: settings.answerDays,
      working_weekdays: JSON.stringify(settings.workingWeekdays),
      remind_days: settings.remindDays,
      retention_months: settings.retentionMonths,
      place_step_hundredths: settings.placeStepHundredths,
      changed_by: changedBy,
      changed_at: new Date(),
    })
    .onConflict('network_id')
    .merge();
}
