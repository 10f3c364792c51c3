/** Lets the title page follow the form of how months are made, while one types; a chosen mark is shown, not sent. */
const form = document.querySelector<HTMLFormElement>('[data-summary-settings]');
const page = form?.querySelector<HTMLElement>('[data-title-preview]');

function part(name: string): HTMLElement | null {
  return page?.querySelector<HTMLElement>(`[data-preview-${name}]`) ?? null;
}

function follow(entered: HTMLFormElement): void {
  const data = new FormData(entered);
  const text = (field: string) => {
    const value = data.get(field);
    return typeof value === 'string' ? value.trim() : '';
  };
  const name = part('name');
  if (name) name.textContent = text('networkName') || (name.dataset['fallback'] ?? '');
  const introduction = part('introduction');
  if (introduction) introduction.textContent = text('introduction');
  const chosen = entered.querySelectorAll<HTMLInputElement>('input[name="sections"]:checked');
  part('sections')?.replaceChildren(
    ...Array.from(chosen, (box) => {
      const item = document.createElement('li');
      item.textContent = box.closest('label')?.textContent?.trim() ?? '';
      return item;
    }),
  );
  showMark(data);
}

let shownUrl: string | null = null;

function showMark(data: FormData): void {
  const image = part('mark');
  const file = data.get('mark');
  if (!(image instanceof HTMLImageElement)) return;
  const stored = image.dataset['stored'] ?? image.getAttribute('src') ?? '';
  image.dataset['stored'] = stored;
  if (shownUrl) URL.revokeObjectURL(shownUrl);
  shownUrl = file instanceof File && file.size > 0 ? URL.createObjectURL(file) : null;
  const source = shownUrl ?? (data.get('noMark') === 'yes' ? '' : stored);
  image.hidden = source === '';
  if (source !== '') image.src = source;
}

if (form) form.addEventListener('input', () => follow(form));
