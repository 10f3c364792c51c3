import { randomUUID } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { type Browser, type Page } from 'playwright-core';
import { inTransaction } from '#db/queries/connection';
import { insertMembership, insertUser } from '#db/queries/users';
import { launchChromium } from '#ops/chromium';
import { sessionCookieName, startSession } from '#lib/auth/sessions';

const SHOWN_WITHIN_MS = 60_000;
/** A new window of the browser is busy with itself for a while; a person's has long been open. */
const SETTLES_MS = 2500;

/** A page whose scripts are weighed. */
export interface ScriptsOf {
  path: string;
  /** Selector of what it shows when its scripts are there. */
  until: string;
  isSignedIn?: boolean;
}

/** An operator of a network in a browser, signed in, who visits pages with nothing cached. */
export class Visitor {
  private constructor(
    private readonly browser: Browser,
    private readonly origin: string,
    private readonly session: string,
    readonly userId: string,
  ) {}

  static async start(networkId: number, origin: string): Promise<Visitor> {
    const id = randomUUID();
    await inTransaction(async (transaction) => {
      const email = `${id.slice(0, 8)}@bench.example`;
      const person = { id, email, name: 'Bench Operator', passwordHash: '-', isAdministrator: false };
      await insertUser(person, transaction);
      await insertMembership({ userId: id, networkId, role: 'operator' }, transaction);
    });
    const browser = await launchChromium();
    return new Visitor(browser, origin, (await startSession(id)).value, id);
  }

  /** Runs `work` with a page of a browser profile of its own, signed in unless told otherwise; `script` runs before each page's. */
  async visit<T>(
    work: (page: Page) => Promise<T>,
    { script, isSignedIn = true }: { script?: () => void; isSignedIn?: boolean } = {},
  ): Promise<T> {
    const context = await this.browser.newContext({
      baseURL: this.origin,
      viewport: { width: 1280, height: 860 },
    });
    if (isSignedIn) {
      await context.addCookies([{ name: sessionCookieName(), value: this.session, url: this.origin }]);
    }
    // The compiler that runs this names functions by a helper that the browser does not have.
    await context.addInitScript({ content: 'globalThis.__name ??= (named) => named;' });
    if (script) await context.addInitScript(script);
    try {
      const page = await context.newPage();
      await page.waitForTimeout(SETTLES_MS);
      return await work(page);
    } finally {
      await context.close();
    }
  }

  /** Bytes, gzipped, of all scripts that a page fetches until it shows `until` and is idle, its workers' too. */
  async scriptBytes({ path, until, isSignedIn = true }: ScriptsOf): Promise<number> {
    return this.visit(
      async (page) => {
        const sizes: Promise<number>[] = [];
        page.context().on('response', (response) => {
          if (!/\.m?js(\?|$)/.test(response.url()) || !response.ok()) return;
          sizes.push(response.body().then((body) => gzipSync(body).length));
        });
        const response = await page.goto(path);
        if (!response?.ok()) throw new Error(`${path} answered ${response?.status()}.`);
        await page.waitForSelector(until, { timeout: SHOWN_WITHIN_MS });
        await page.waitForLoadState('networkidle');
        return (await Promise.all(sizes)).reduce((sum, size) => sum + size, 0);
      },
      { isSignedIn },
    );
  }

  async stop(): Promise<void> {
    await this.browser.close();
  }
}
