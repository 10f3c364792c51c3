/** Offers only the bands of the width that is chosen; a band that octaves lack moves to the nearest that they have. */
class BandFields extends HTMLElement {
  connectedCallback(): void {
    this.addEventListener('change', (event) => {
      if (event.target instanceof HTMLInputElement && event.target.name === 'bandFraction') this.offer();
    });
    this.offer();
  }

  private offer(): void {
    const isOctaves = this.querySelector<HTMLInputElement>('[name=bandFraction]:checked')?.value === '1';
    const octaves = new Set((this.dataset['octaves'] ?? '').split(' '));
    for (const select of this.querySelectorAll('select')) {
      for (const option of select.options) {
        const isOffered = !isOctaves || octaves.has(option.value);
        option.hidden = !isOffered;
        option.disabled = !isOffered;
      }
      if (select.selectedOptions[0]?.disabled) select.value = nearest(select.value, octaves);
    }
  }
}

function nearest(hz: string, offered: Set<string>): string {
  const distance = (other: string) => Math.abs(Math.log(Number(other) / Number(hz)));
  return [...offered].reduce((best, other) => (distance(other) < distance(best) ? other : best));
}

if (!customElements.get('band-fields')) customElements.define('band-fields', BandFields);
