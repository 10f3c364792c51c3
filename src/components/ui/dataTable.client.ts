import { csvOfTable } from './tableCsv.client';

/** Adds to a plain table what needs JavaScript: sorting, filtering, choice of columns, and a CSV of exactly what is shown. */
class DataTable extends HTMLElement {
  private sorted: { column: number; isDescending: boolean } | null = null;

  connectedCallback(): void {
    this.addSorting();
    this.addFilter();
    this.addColumnChoice();
    this.addCsv();
  }

  private get headings(): HTMLTableCellElement[] {
    return [...this.querySelectorAll<HTMLTableCellElement>('thead th')];
  }

  private get rows(): HTMLTableRowElement[] {
    return [...this.querySelectorAll<HTMLTableRowElement>('tbody tr')];
  }

  private addSorting(): void {
    this.headings.forEach((heading, column) => {
      if (!heading.dataset['sortable']) return;
      const button = document.createElement('button');
      button.type = 'button';
      button.append(...heading.childNodes);
      heading.append(button);
      button.addEventListener('click', () => this.sortBy(column));
    });
  }

  private sortBy(column: number): void {
    const isDescending = this.sorted?.column === column && !this.sorted.isDescending;
    this.sorted = { column, isDescending };
    const isNumber = this.headings[column]?.dataset['sortable'] === 'number';
    const sign = isDescending ? -1 : 1;
    const ordered = this.rows
      .map((row) => ({ row, key: keyOf(row.cells[column], isNumber) }))
      .sort((a, b) => compare(a.key, b.key, sign));
    this.querySelector('tbody')?.append(...ordered.map(({ row }) => row));
    this.headings.forEach((heading, at) => {
      if (at === column) heading.ariaSort = isDescending ? 'descending' : 'ascending';
      else heading.removeAttribute('aria-sort');
    });
  }

  private addFilter(): void {
    const label = this.querySelector<HTMLElement>('[data-filter]');
    const input = label?.querySelector('input');
    if (!label || !input) return;
    label.hidden = false;
    input.addEventListener('input', () => this.filterBy(input.value.trim().toLowerCase()));
  }

  private filterBy(wanted: string): void {
    const { rows } = this;
    for (const row of rows) row.hidden = !(row.textContent ?? '').toLowerCase().includes(wanted);
    const shown = rows.filter((row) => !row.hidden).length;
    const count = this.querySelector('[data-count]');
    if (count) count.textContent = wanted ? `${shown} of ${rows.length} rows` : '';
  }

  private addColumnChoice(): void {
    const choice = this.querySelector<HTMLElement>('[data-columns]');
    const list = choice?.querySelector('[data-choices]');
    if (!choice || !list || !this.headings.some((heading) => 'optional' in heading.dataset)) return;
    choice.hidden = false;
    this.headings.forEach((heading, column) => {
      const box = document.createElement('input');
      box.type = 'checkbox';
      box.checked = !('optional' in heading.dataset);
      const label = document.createElement('label');
      label.className = 'flex items-center gap-2 py-0.5';
      label.append(box, heading.dataset['label'] ?? '');
      list.append(label);
      box.addEventListener('change', () => this.showColumn(column, box.checked));
      this.showColumn(column, box.checked);
    });
  }

  private showColumn(column: number, isShown: boolean): void {
    for (const row of this.querySelectorAll('tr')) {
      const cell = row.cells[column];
      if (cell) cell.hidden = !isShown;
    }
  }

  private addCsv(): void {
    const button = this.querySelector<HTMLButtonElement>('[data-csv]');
    const table = this.querySelector('table');
    if (!button || !table) return;
    button.hidden = false;
    button.addEventListener('click', () => {
      const link = document.createElement('a');
      link.href = URL.createObjectURL(new Blob([csvOfTable(table)], { type: 'text/csv;charset=utf-8' }));
      link.download = `${this.dataset['csvName'] ?? 'table'}.csv`;
      link.click();
      URL.revokeObjectURL(link.href);
    });
  }
}

type Key = string | number | null;

/** What a cell sorts by: its `data-sort`, else its text; null sorts last either way. */
function keyOf(cell: HTMLTableCellElement | undefined, isNumber: boolean): Key {
  const text = (cell?.dataset['sort'] ?? cell?.textContent ?? '').trim();
  if (!isNumber) return text === '' ? null : text;
  const value = Number.parseFloat(text.replace('\u2212', '-'));
  return Number.isNaN(value) ? null : value;
}

function compare(a: Key, b: Key, sign: number): number {
  if (a === null || b === null) return (a === null ? 1 : 0) - (b === null ? 1 : 0);
  if (typeof a === 'number' && typeof b === 'number') return sign * (a - b);
  return sign * String(a).localeCompare(String(b), 'en', { numeric: true });
}

if (!customElements.get('data-table')) customElements.define('data-table', DataTable);
