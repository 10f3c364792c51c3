/**
 * An error in words that may be logged and shown to operators. The words of a failed statement hold the values it was given, which may be
 * a resident's: of it only the database's code and the table are told.
 */
export function failureWords(error: unknown): string {
  if (!(error instanceof Error)) return typeof error === 'string' ? error : 'unknown';
  const { sql, code, errno } = error as Error & { sql?: string; code?: string; errno?: number };
  if (sql === undefined) return error.message || error.name;
  const table = /\b(?:into|from|update|join|table)\s+`?(\w+)`?/i.exec(sql)?.[1];
  return [`database: ${code ?? errno ?? 'failed'}`, ...(table ? [`at ${table}`] : [])].join(' ');
}
