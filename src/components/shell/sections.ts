/** The pages of a network, as the rail lists them. */
export type Section =
  | 'map'
  | 'stations'
  | 'health'
  | 'instruments'
  | 'weather'
  | 'plants'
  | 'activities'
  | 'exceedances'
  | 'complaints'
  | 'summaries'
  | 'limits'
  | 'alerts'
  | 'imports'
  | 'quarantine'
  | 'exclusions'
  | 'settings';

export interface SectionLink {
  section: Section;
  label: string;
  /** Sections that show data take the period along. */
  keepsPeriod: boolean;
}

export const SECTION_LINKS: readonly SectionLink[] = [
  { section: 'map', label: 'Map', keepsPeriod: true },
  { section: 'stations', label: 'Stations', keepsPeriod: true },
  { section: 'health', label: 'Health', keepsPeriod: false },
  { section: 'exceedances', label: 'Exceedances', keepsPeriod: true },
  { section: 'complaints', label: 'Complaints', keepsPeriod: false },
  { section: 'summaries', label: 'Summaries', keepsPeriod: false },
  { section: 'limits', label: 'Limits', keepsPeriod: false },
  { section: 'alerts', label: 'Alerts', keepsPeriod: false },
  { section: 'instruments', label: 'Instruments', keepsPeriod: false },
  { section: 'weather', label: 'Weather', keepsPeriod: true },
  { section: 'plants', label: 'Plant', keepsPeriod: false },
  { section: 'activities', label: 'Operations', keepsPeriod: true },
  { section: 'imports', label: 'Imports', keepsPeriod: false },
  { section: 'quarantine', label: 'Quarantine', keepsPeriod: false },
  { section: 'exclusions', label: 'Exclusions', keepsPeriod: false },
];

/** Address of a section; `period` is the query that carries the period, or empty. */
export function sectionHref(slug: string, { section, keepsPeriod }: SectionLink, period: string): string {
  return `/n/${slug}/${section}${keepsPeriod ? period : ''}`;
}

/** The query of an address reduced to its period. */
export function periodQuery(url: URL): string {
  const [from, to] = [url.searchParams.get('from'), url.searchParams.get('to')];
  if (!from || !to) return '';
  const query = new URLSearchParams({ from, to });
  return `?${query.toString().replaceAll('%3A', ':')}`;
}
