import type { AstroGlobal } from 'astro';
import { readUrlPeriod, type UrlPeriod } from '#lib/time/urlPeriod';

/** For a page's frontmatter: the period in its address. A wrong one is told by the page, which then answers 400. */
export function pagePeriod(astro: AstroGlobal, zone: string, nowSec: number): UrlPeriod {
  const period = readUrlPeriod(astro.url, zone, nowSec);
  if (period.problem !== null) astro.response.status = 400;
  return period;
}
