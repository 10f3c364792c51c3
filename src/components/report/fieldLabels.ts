import type { ReportField } from '#lib/contracts/reports';
import type { ReportWords } from './words/en';

/** What each field is called above the form, in the resident's language. */
export function fieldLabels(words: ReportWords): Record<ReportField | 'file' | 'addition' | 'erase', string> {
  const { lasting, day, clock, from, to, kind, area, place, name, email, phone, address, file, erase } =
    words;
  return {
    lasting,
    day,
    clock,
    from,
    to,
    kind,
    area,
    place,
    name,
    email,
    phone,
    address,
    file,
    erase,
    when: words.when,
    words: words.words,
    consent: words.consent,
    addition: words.addLabel,
  };
}
