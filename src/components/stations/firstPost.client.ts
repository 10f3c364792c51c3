import type { Station } from '#lib/contracts/stations';
import { arrivalWords } from './arrivalWords';

const FIRST_DELAY_MS = 2000;
const LONGEST_DELAY_MS = 30_000;
const BACKOFF = 1.25;

/**
 * Asks for the station's newest interval, ever more seldom and only while the page is looked at, until one has arrived that
 * was not there before.
 */
class FirstPost extends HTMLElement {
  private delayMs = FIRST_DELAY_MS;
  private timer: number | undefined;

  connectedCallback(): void {
    document.addEventListener('visibilitychange', this.look);
    if (!this.dataset['seen']) this.piece('waiting').textContent = 'Waiting for the first post …';
    this.plan();
  }

  disconnectedCallback(): void {
    this.stop();
  }

  private plan(): void {
    this.timer = window.setTimeout(this.look, this.delayMs);
    this.delayMs = Math.min(LONGEST_DELAY_MS, this.delayMs * BACKOFF);
  }

  private readonly look = async (): Promise<void> => {
    window.clearTimeout(this.timer);
    if (document.hidden) return;
    const response = await this.ask();
    if (response?.status === 401)
      return this.end('You have been signed out. Sign in again to go on watching.');
    if (response && response.status < 500 && !response.ok)
      return this.end('The station is no longer to be seen.');
    const station = response?.ok ? ((await response.json()) as { station: Station }).station : null;
    if (station?.latest && station.latest.receivedAt !== this.dataset['seen']) {
      const words = arrivalWords(station.latest, this.dataset['zone'] ?? 'UTC');
      return this.arrive(this.dataset['seen'] ? 'A new interval has arrived:' : 'First post arrived:', words);
    }
    this.plan();
  };

  private async ask(): Promise<Response | null> {
    try {
      return await fetch(this.dataset['url'] ?? '', { headers: { Accept: 'application/json' } });
    } catch {
      // Out of reach for now; the next attempt may get through.
      return null;
    }
  }

  private arrive(title: string, words: string): void {
    this.piece('title').textContent = title;
    this.piece('words').textContent = words;
    this.piece('arrived').hidden = false;
    this.piece('waiting').hidden = true;
    this.piece('said').textContent = `${title} ${words}`;
    this.stop();
  }

  private end(words: string): void {
    this.piece('waiting').hidden = false;
    this.piece('waiting').textContent = words;
    this.piece('said').textContent = words;
    this.stop();
  }

  private stop(): void {
    window.clearTimeout(this.timer);
    document.removeEventListener('visibilitychange', this.look);
  }

  private piece(name: string): HTMLElement {
    const element = this.querySelector<HTMLElement>(`[data-${name}]`);
    if (!element) throw new Error(`The first-post element lacks its ${name}.`);
    return element;
  }
}

if (!customElements.get('first-post')) customElements.define('first-post', FirstPost);
