const DAY_MS = 86_400_000;
/** RFC 9116 recommends less than a year. */
const VALID_DAYS = 180;

/**
 * Where to tell of weaknesses (RFC 9116). It is made anew for each request, so that it never is out of date while it is served.
 * `contact`: an address with `mailto:` or `https:`. `origin`: Bittern's own address.
 */
export function securityText(contact: string, origin: string, now: Date): string {
  const expires = new Date(now.getTime() + VALID_DAYS * DAY_MS).toISOString().slice(0, 10);
  const lines = [
    `Contact: ${contact}`,
    `Expires: ${expires}T00:00:00Z`,
    'Preferred-Languages: en',
    `Canonical: ${origin}/.well-known/security.txt`,
  ];
  return lines.map((line) => `${line}\n`).join('');
}
