/** Address of a station in the interface. */
export function stationUrlOf(slug: string, code: string): string {
  return `/api/v1/networks/${slug}/stations/${encodeURIComponent(code)}`;
}
