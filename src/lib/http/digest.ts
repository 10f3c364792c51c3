/** The 32 bytes of a SHA-256 that somebody gave as hexadecimal digits, in either case, with spaces or colons between; null for anything else. */
export function digestOf(text: string | null | undefined): Buffer | null {
  const digits = (text ?? '').slice(0, 200).replace(/[\s:]/g, '');
  return /^[0-9a-f]{64}$/i.test(digits) ? Buffer.from(digits, 'hex') : null;
}
