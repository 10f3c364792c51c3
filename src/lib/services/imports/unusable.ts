/** An uploaded file that is not kept; the message says why. */
export class UnusableFile extends Error {
  override readonly name = 'UnusableFile';

  constructor(
    readonly kind: 'too-large' | 'unreadable',
    message: string,
  ) {
    super(message);
  }
}
