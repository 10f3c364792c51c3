import { readEvents } from './readEvents';

/**
 * Shows how far what a form asks for is, and stops it; the page then has the answer. Without it the page is simply waited for.
 * `data-doing`: words before anything is known; `data-of`: what is counted; `data-stopped`: words after stopping.
 */
class ProgressForm extends HTMLElement {
  private stop: AbortController | null = null;

  connectedCallback(): void {
    this.querySelector('form')?.addEventListener('submit', (event) => this.begin(event));
    this.querySelector('[data-stop]')?.addEventListener('click', () => this.stop?.abort());
  }

  disconnectedCallback(): void {
    this.stop?.abort();
  }

  private begin(event: SubmitEvent): void {
    const form = event.currentTarget;
    if (!(form instanceof HTMLFormElement)) return;
    event.preventDefault();
    const query = new URLSearchParams();
    for (const [name, value] of new FormData(form)) if (typeof value === 'string') query.append(name, value);
    void this.ask(`${location.pathname}?${query}`);
  }

  private async ask(address: string): Promise<void> {
    this.stop?.abort();
    const stop = new AbortController();
    this.stop = stop;
    this.show(this.dataset['doing'] ?? '', true);
    try {
      const answer = await fetch(address, { headers: { Accept: 'text/event-stream' }, signal: stop.signal });
      const isStream = answer.headers.get('content-type')?.startsWith('text/event-stream');
      if (isStream && answer.body) await readEvents(answer.body, (name, data) => this.hear(name, data));
    } catch (error) {
      if (!stop.signal.aborted) throw error;
      return this.show(this.dataset['stopped'] ?? '', false);
    }
    // The page has the answer, or says what is wrong.
    location.assign(address);
  }

  private hear(name: string, data: unknown): void {
    if (name !== 'progress') return;
    const { done, all } = data as { done: number; all: number };
    const bar = this.querySelector('progress');
    if (bar) [bar.max, bar.value] = [Math.max(1, all), done];
    this.show(`${done} of ${all} ${this.dataset['of'] ?? ''}`, true);
  }

  private show(words: string, isAsking: boolean): void {
    const status = this.querySelector('[role=status]');
    if (status) status.textContent = words;
    for (const part of this.querySelectorAll<HTMLElement>('[data-stop], progress')) part.hidden = !isAsking;
  }
}

customElements.define('progress-form', ProgressForm);
