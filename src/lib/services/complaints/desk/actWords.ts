/** What the audit trail's names for acts on a complaint mean, in words. */
export const ACT_WORDS: Readonly<Record<string, string>> = {
  'complaint.log': 'Logged at the desk',
  'complaint.report': 'Reported by the resident',
  'complaint.report-add': 'The resident added something',
  'complaint.reply': 'Reply sent',
  'complaint.reply-posted': 'Letter noted as posted',
  'complaint.reply-not-posted': 'Letter noted as not posted after all',
  'complaint.answer-keep': 'Answer written on',
  'complaint.answer-discard': 'Answer discarded',
  'complaint.answer-submit': 'Answer submitted for approval',
  'complaint.answer-give-back': 'Answer given back to be written on',
  'complaint.answer-take-back': 'Answer taken back by its author',
  'complaint.received-file': 'Answer of the resident filed',
  'complaint.received-withdraw': 'Filed answer withdrawn',
  'complaint.close': 'Closed without a reply',
  'complaint.assign': 'Given to somebody else',
  'complaint.merge': 'Merged into another one',
  'complaint.unmerge': 'Merge undone',
  'complaint.note-add': 'Internal note written',
  'complaint.note-withdraw': 'Internal note withdrawn',
  'complaint.note-restore': 'Internal note put back',
  'complaint.contact-correct': 'Contact corrected',
  'complaint.personal-data-read': 'Personal data looked at',
  'complaint.personal-data-export': 'Personal data taken out for a data request',
  'complaint.personal-data-erase': 'Personal data erased',
};

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
