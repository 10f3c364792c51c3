import type { PersonalData } from '#lib/contracts/complaints';

/** Names of the personal fields that hold something: what the audit trail may record, never their values. */
export function filledFields({ contact, words, place, effects = [] }: PersonalData): string[] {
  const named = Object.entries(contact)
    .filter(([, value]) => value !== null)
    .map(([field]) => field);
  return [
    ...named,
    ...(words === '' ? [] : ['words']),
    ...(place ? ['place'] : []),
    ...(effects.length > 0 ? ['effects'] : []),
  ];
}
