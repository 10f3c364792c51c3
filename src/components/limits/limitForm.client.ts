/**
 * Hides what does not go with the other choices (`data-goes-with="name=value value"`), so that it is not sent either, and says
 * when the beginning is past.
 */
class LimitForm extends HTMLElement {
  connectedCallback(): void {
    this.addEventListener('change', () => this.update());
    this.update();
  }

  private update(): void {
    for (const part of this.querySelectorAll<HTMLElement>('[data-goes-with]')) {
      const [name = '', values = ''] = (part.dataset['goesWith'] ?? '').split('=');
      const chosen = this.querySelector<HTMLInputElement>(`[name="${name}"]:checked`)?.value ?? '';
      const isAsked = values.split(' ').includes(chosen);
      part.hidden = !isAsked;
      for (const control of part.querySelectorAll<HTMLInputElement | HTMLSelectElement>('input, select')) {
        control.disabled = !isAsked;
      }
    }
    const from = this.querySelector<HTMLInputElement>('[name=effectiveFrom]')?.value ?? '';
    const past = this.querySelector<HTMLElement>('[data-past]');
    if (past) past.hidden = from === '' || from >= (this.dataset['now'] ?? '');
  }
}

if (!customElements.get('limit-form')) customElements.define('limit-form', LimitForm);
