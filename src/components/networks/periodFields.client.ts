type Hours = Record<string, string>;

/** Shows a preset's hours as soon as it is chosen; changed by hand, they are no longer the preset's. */
class PeriodFields extends HTMLElement {
  connectedCallback(): void {
    this.addEventListener('input', ({ target }) => {
      if (target instanceof HTMLSelectElement) this.fill(target.value);
      else if (target instanceof HTMLInputElement) this.unchoose();
    });
  }

  private fill(key: string): void {
    const hours = (JSON.parse(this.dataset['hours'] ?? '{}') as Record<string, Hours>)[key];
    for (const [name, text] of Object.entries(hours ?? {})) {
      const input = this.querySelector<HTMLInputElement>(`[name=${name}]`);
      if (input) input.value = text;
    }
  }

  private unchoose(): void {
    const select = this.querySelector('select');
    if (select) select.value = '';
  }
}

if (!customElements.get('period-fields')) customElements.define('period-fields', PeriodFields);
