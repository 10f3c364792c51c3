/** A path without what is secret in it: the key of a resident's private page, the token of a mailed link. */
export function loggedPath(path: string): string {
  return path.replace(/^(\/(?:report\/[^/]+|join|reset|acknowledge)\/).+/, '$1…');
}
