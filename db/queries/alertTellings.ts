import { pool, type Connection } from './connection';

export type TellingKind = 'escalation' | 'early-warning';

/** Claims something to be told once for good; false when it was told, or is being told by another worker. */
export async function claimTelling(
  kind: TellingKind,
  subject: string,
  now: Date,
  transaction: Connection,
): Promise<boolean> {
  try {
    await transaction('alert_tellings').insert({ kind, subject, told_at: now });
    return true;
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    return false;
  }
}

/** Which of some subjects were told. */
export async function findTold(
  kind: TellingKind,
  subjects: readonly string[],
  conn: Connection = pool(),
): Promise<Set<string>> {
  if (subjects.length === 0) return new Set();
  return new Set<string>(
    await conn('alert_tellings')
      .where({ kind })
      .whereIn('subject', [...subjects])
      .pluck('subject'),
  );
}

export async function deleteTellingsBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('alert_tellings').where('told_at', '<', before).delete();
}
