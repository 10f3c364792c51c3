/** Puts a field into the letter where its cursor stands. Without scripts it is typed. */
class FieldList extends HTMLElement {
  connectedCallback(): void {
    for (const button of this.querySelectorAll<HTMLButtonElement>('[data-field]')) {
      button.disabled = false;
      button.addEventListener('click', () => insert(button.dataset['field'] ?? ''));
    }
  }
}

function insert(name: string): void {
  const letter = document.querySelector<HTMLTextAreaElement>('textarea[name="body"]');
  if (!letter) return;
  const { selectionStart: start, selectionEnd: end } = letter;
  letter.setRangeText(`{{${name}}}`, start, end, 'end');
  letter.focus();
}

if (!customElements.get('field-list')) customElements.define('field-list', FieldList);
