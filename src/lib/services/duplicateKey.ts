/** Whether an error is MariaDB's "duplicate entry" (1062): a name that is taken. */
export function isDuplicateKey(error: unknown): boolean {
  return (error as { errno?: number } | null)?.errno === 1062;
}
