/** Who looks at a page; `nobody` is not signed in. */
export const LOOKERS = ['nobody', 'operator', 'liaison', 'regulator', 'admin'] as const;
export type Looker = (typeof LOOKERS)[number];

/** A demo account of a running Bittern, as a caller of it. */
export class Session {
  private constructor(
    readonly looker: Looker,
    readonly origin: string,
    /** The `Cookie` header that carries it; empty for nobody. */
    readonly cookie: string,
  ) {}

  /** Signs in through the interface. @throws when the server refuses it. */
  static async start(looker: Looker, origin: string, password: string): Promise<Session> {
    if (looker === 'nobody') return new Session(looker, origin, '');
    const answer = await fetch(`${origin}/api/v1/session`, {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({ email: `${looker}@merrow.example`, password }),
    });
    if (answer.status !== 204) {
      throw new Error(
        `The sign-in of ${looker} was refused (${answer.status}). Is BITTERN_DEMO_PASSWORD right?`,
      );
    }
    const cookies = answer.headers.getSetCookie().map((value) => value.split(';')[0]);
    return new Session(looker, origin, cookies.join('; '));
  }

  ask(path: string): Promise<Response> {
    return fetch(`${this.origin}${path}`, { headers: { Cookie: this.cookie }, redirect: 'manual' });
  }

  /** Whether it is shown a page at an address. */
  async isShown(path: string): Promise<boolean> {
    const answer = await this.ask(path);
    await answer.body?.cancel();
    return answer.status === 200 && (answer.headers.get('content-type') ?? '').startsWith('text/html');
  }
}
