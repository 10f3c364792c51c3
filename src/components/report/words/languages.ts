import { REPORT_LANGUAGES, type ReportLanguage } from '#lib/contracts/reports';
import { de } from './de';
import { en, type ReportWords } from './en';

export const REPORT_WORDS: Readonly<Record<ReportLanguage, ReportWords>> = { en, de };

/** The language asked for, else the first that the browser wants and that is there, else English. */
export function languageOf(asked: string | null, accepted: string | null): ReportLanguage {
  const known = REPORT_LANGUAGES.find((language) => language === asked);
  if (known) return known;
  const wanted = (accepted ?? '').split(',').map((part) => part.trim().slice(0, 2).toLowerCase());
  const found = wanted.flatMap((wish) => REPORT_LANGUAGES.filter((language) => language === wish));
  return found[0] ?? 'en';
}
