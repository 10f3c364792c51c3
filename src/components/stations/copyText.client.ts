/** Copies the text of its code block. */
class CopyText extends HTMLElement {
  connectedCallback(): void {
    const button = this.querySelector<HTMLButtonElement>('[data-copy]');
    // Without https the clipboard is out of reach; the text can still be selected.
    if (!button || !navigator.clipboard) return;
    button.hidden = false;
    button.addEventListener('click', () => void this.copy());
  }

  private async copy(): Promise<void> {
    const said = this.querySelector('[data-said]');
    const text = this.querySelector('code')?.textContent ?? '';
    let words = 'Copied.';
    try {
      await navigator.clipboard.writeText(text);
    } catch {
      words = 'The browser did not allow it. Select the text and copy it.';
    }
    if (said) said.textContent = words;
  }
}

if (!customElements.get('copy-text')) customElements.define('copy-text', CopyText);
