/** The header that says of when data from a replica are; none where they are of now. */
export function asOfHeader(dataAsOf: Date | null): Record<string, string> {
  return dataAsOf ? { 'Data-As-Of': dataAsOf.toISOString().replace('.000Z', 'Z') } : {};
}
