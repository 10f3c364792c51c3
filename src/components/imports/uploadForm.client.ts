import { sizeWords } from './words';
import { PART_BYTES, uploadInParts, UploadRefused, type Means, type UploadProgress } from './uploadInParts';

const MEANS: Means = {
  ask: (address, request) => fetch(address, request),
  waitMs: (ms, signal) =>
    new Promise((done) => {
      const timer = setTimeout(done, ms);
      signal.addEventListener('abort', () => (clearTimeout(timer), done()), { once: true });
    }),
};

/** Sends a large file in parts, shows how far it is, and goes on after breaks; a small one goes as the form itself does. */
class UploadForm extends HTMLElement {
  private stop: AbortController | null = null;

  connectedCallback(): void {
    this.querySelector('form')?.addEventListener('submit', (event) => this.begin(event));
    this.querySelector('[data-stop]')?.addEventListener('click', () => this.stop?.abort());
  }

  disconnectedCallback(): void {
    this.stop?.abort();
  }

  private begin(event: SubmitEvent): void {
    const station = this.querySelector<HTMLSelectElement>('[name=station]')?.value ?? '';
    const file = this.querySelector<HTMLInputElement>('[name=file]')?.files?.[0];
    if (station === '' || !file || file.size <= PART_BYTES) return;
    event.preventDefault();
    void this.send(station, file);
  }

  private async send(station: string, file: File): Promise<void> {
    const stop = new AbortController();
    this.stop = stop;
    this.setSending(true);
    try {
      const base = this.dataset['uploads'] ?? '';
      const onProgress = (progress: UploadProgress) => this.show(progress);
      const id = await uploadInParts({ base, station, file, signal: stop.signal, onProgress }, MEANS);
      location.assign(`${this.dataset['imports']}/${id}`);
    } catch (error) {
      this.setSending(false);
      if (stop.signal.aborted)
        this.say('Stopped. What was sent is kept: choose the same file again and it goes on.');
      else if (error instanceof UploadRefused) this.say(error.message);
      else throw error;
    }
  }

  private setSending(isSending: boolean): void {
    for (const control of this.querySelectorAll<HTMLInputElement>('form :is(select, input, [type=submit])')) {
      control.disabled = isSending;
    }
    const sending = this.querySelector<HTMLElement>('[data-sending]');
    if (sending) sending.hidden = !isSending;
    this.say('');
  }

  private show({ sentBytes, wholeBytes, waitSec }: UploadProgress): void {
    const percent = Math.floor((sentBytes / wholeBytes) * 100);
    const bar = this.querySelector('progress');
    if (bar) bar.value = percent;
    const far = this.querySelector('[data-far]');
    if (!far) return;
    const sent = `${percent} %: ${sizeWords(sentBytes)} of ${sizeWords(wholeBytes)} sent.`;
    const ended = sentBytes === wholeBytes ? ' The server puts it together.' : '';
    far.textContent =
      waitSec === null ? `${sent}${ended}` : `${sent} No answer; tried again in ${waitSec} s.`;
  }

  private say(words: string): void {
    const said = this.querySelector<HTMLElement>('[data-said]');
    if (!said) return;
    said.textContent = words;
    said.hidden = words === '';
  }
}

if (!customElements.get('upload-form')) customElements.define('upload-form', UploadForm);
