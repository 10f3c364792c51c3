/** A path of this site to go on to, never another site's address; the front page where there is none. */
export function ownPath(given: FormDataEntryValue | null | undefined): string {
  return typeof given === 'string' && /^\/(?![/\\])[\x21-\x7e]*$/.test(given) ? given : '/';
}
