import type { Hit } from '#lib/contracts/search';
import { areSingleKeysOn, isTyping } from '../shell/singleKeys';
import { KIND_WORDS } from './kindWords';

const WAIT_MS = 120;
const READY = 'Arrows choose, Enter opens, Escape closes.';

const dialog = document.querySelector<HTMLDialogElement>('[data-search]');
if (dialog) makeSearch(dialog);

function makeSearch(box: HTMLDialogElement): void {
  const input = box.querySelector('input');
  const list = box.querySelector<HTMLElement>('[role=listbox]');
  const status = box.querySelector('[role=status]');
  if (!input || !list || !status) return;
  const parts = { box, input, list, status };

  let wait: ReturnType<typeof setTimeout> | undefined;
  const open = () => {
    if (box.open) return;
    box.showModal();
    input.select();
    void look(parts);
  };
  document.addEventListener('keydown', (event) => {
    if (!isOpening(event)) return;
    event.preventDefault();
    open();
  });
  document.addEventListener('click', (event) => {
    if (!(event.target instanceof Element)) return;
    if (event.target === box || event.target.closest('[data-closes-search]')) box.close();
    if (!event.target.closest('[data-opens-search]') || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    open();
  });
  input.addEventListener('input', () => {
    clearTimeout(wait);
    wait = setTimeout(() => void look(parts), WAIT_MS);
  });
  input.addEventListener('keydown', (event) => onKey(event, parts));
}

interface Parts {
  box: HTMLDialogElement;
  input: HTMLInputElement;
  list: HTMLElement;
  status: Element;
}

function isOpening(event: KeyboardEvent): boolean {
  if ((event.ctrlKey || event.metaKey) && !event.altKey && event.key.toLowerCase() === 'k') return true;
  if (event.ctrlKey || event.metaKey || event.altKey || event.key !== '/') return false;
  return areSingleKeysOn() && !isTyping(event) && !document.querySelector('dialog[open]');
}

let lastLook: AbortController | undefined;

/** Asks for what is typed and shows it; what was asked before is given up. */
async function look({ box, input, list, status }: Parts): Promise<void> {
  lastLook?.abort();
  const { signal } = (lastLook = new AbortController());
  try {
    const query = new URLSearchParams({ q: input.value });
    const response = await fetch(`${box.dataset['search']}?${query.toString()}`, { signal });
    if (!response.ok) throw new Error(String(response.status));
    const { items } = (await response.json()) as { items: Hit[] };
    list.replaceChildren(...items.map(optionOf));
    choose(list, input, 0);
    status.textContent =
      items.length > 0 ? READY : 'Nothing of that name. Complaints are found by reference.';
  } catch {
    if (signal.aborted) return;
    list.replaceChildren();
    status.textContent = 'The search cannot be done at the moment. Check the connection, or reload the page.';
  }
}

function optionOf({ kind, label, detail, href }: Hit, at: number): HTMLAnchorElement {
  const option = document.createElement('a');
  option.id = `search-hit-${at}`;
  option.className = 'search-hit';
  option.href = href;
  option.role = 'option';
  option.tabIndex = -1;
  option.append(
    wrap('min-w-0', label, detail && wrap('text-ink-soft ml-2', detail)),
    wrap('text-ink-soft text-small shrink-0', KIND_WORDS[kind]),
  );
  return option;
}

function wrap(className: string, ...content: (Node | string)[]): HTMLSpanElement {
  const span = document.createElement('span');
  span.className = className;
  span.append(...content);
  return span;
}

const STEPS: Record<string, number> = { ArrowDown: 1, ArrowUp: -1, PageDown: 8, PageUp: -8 };

function onKey(event: KeyboardEvent, { input, list }: Parts): void {
  const chosenAt = [...list.children].findIndex((option) => option.ariaSelected === 'true');
  const step = STEPS[event.key];
  if (step !== undefined) {
    event.preventDefault();
    choose(list, input, chosenAt + step);
  }
  if (event.key === 'Enter') {
    event.preventDefault();
    const chosen = list.children[chosenAt];
    if (chosen instanceof HTMLAnchorElement) chosen.click();
  }
}

/** Marks an option as the one that Enter opens; beyond the ends it stays at the end. */
function choose(list: HTMLElement, input: HTMLInputElement, at: number): void {
  const options = [...list.children];
  const chosen = options[Math.min(options.length - 1, Math.max(0, at))];
  for (const option of options) option.ariaSelected = String(option === chosen);
  input.setAttribute('aria-activedescendant', chosen?.id ?? '');
  chosen?.scrollIntoView({ block: 'nearest' });
}
