/** A JSON column’s value: the driver answers it as text or parsed, as the server tells its type. */
export function jsonOf<T>(value: unknown): T {
  return (typeof value === 'string' ? JSON.parse(value) : value) as T;
}
