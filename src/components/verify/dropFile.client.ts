/** Calculates the digest of a file that is dropped or chosen, and asks for its verdict. The file itself never leaves the browser. */
const MOST_BYTES = 1024 ** 3;

async function digestOf(file: File): Promise<string> {
  const digest = await crypto.subtle.digest('SHA-256', await file.arrayBuffer());
  return Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('');
}

function start(root: HTMLElement): void {
  const status = root.querySelector<HTMLElement>('[data-status]');
  const place = root.querySelector<HTMLElement>('[data-drop]');
  const input = root.querySelector<HTMLInputElement>('input[type="file"]');
  const say = (words: string) => {
    if (status) status.textContent = words;
  };
  const take = async (file: File | undefined) => {
    if (!file) return;
    if (file.size > MOST_BYTES) {
      say('The file is too large to be a month’s. Calculate its SHA-256 and type it below.');
      return;
    }
    say(`Calculating the digest of ${file.name} …`);
    try {
      const query = new URLSearchParams({ sha256: await digestOf(file), file: file.name });
      location.assign(`/verify?${query.toString()}`);
    } catch {
      say('The file could not be read. Choose it again, or type its SHA-256 below.');
    }
  };
  input?.addEventListener('change', () => void take(input.files?.[0]));
  place?.addEventListener('dragover', (event) => {
    event.preventDefault();
    place.dataset['over'] = '';
  });
  place?.addEventListener('dragleave', () => delete place.dataset['over']);
  place?.addEventListener('drop', (event) => {
    event.preventDefault();
    delete place.dataset['over'];
    void take(event.dataTransfer?.files[0]);
  });
  root.hidden = false;
}

const root = document.querySelector<HTMLElement>('[data-verify-file]');
// WebCrypto is there over https and on the machine itself only.
if (root && 'subtle' in crypto) start(root);
