/** The parts of an act's detail that a person wants to read; names of fields, never values of a person. */
export function detailWords(detail: Readonly<Record<string, unknown>>): string {
  const { from, to, into, reason, fields, by, months } = detail;
  const text = (value: unknown) => (typeof value === 'string' ? value : null);
  return [
    'to' in detail && 'from' in detail && typeof from !== 'number'
      ? `from ${text(from) ?? 'nobody'} to ${text(to) ?? 'nobody'}`
      : null,
    text(into) && `into ${text(into)}`,
    text(reason),
    Array.isArray(fields) && fields.length > 0 ? fields.join(', ') : null,
    by === 'retention' && typeof months === 'number' ? `kept no longer than ${months} months` : null,
    by === 'resident' ? 'by the resident' : null,
  ]
    .filter((part) => typeof part === 'string')
    .join('; ');
}
