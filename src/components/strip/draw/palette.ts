/** Colours of the theme in force, as a canvas takes them. */
export interface Palette {
  paper: string;
  ink: string;
  inkSoft: string;
  /** Hairlines. */
  line: string;
  /** What an empty row of the validity strip is drawn on. */
  track: string;
  reed: string;
  rust: string;
  ochre: string;
  /** Ochre for letters. */
  ochreText: string;
  estuary: string;
  hatch: string;
  /** Behind letters that stand on lines. */
  plate: string;
  /** Behind the trace where data do not count. */
  wash: string;
  /** From LAeq up to LAFmax. */
  envelope: string;
  /** From LA90 up to LA10. */
  percentiles: string;
}

const SOURCES: Record<keyof Palette, string> = {
  paper: 'var(--color-paper)',
  ink: 'var(--color-ink)',
  inkSoft: 'var(--color-ink-soft)',
  line: 'var(--color-line)',
  track: 'color-mix(in oklab, var(--color-ink) 7%, transparent)',
  reed: 'var(--color-reed)',
  rust: 'var(--color-rust)',
  ochre: 'var(--color-ochre)',
  ochreText: 'var(--color-ochre-text)',
  estuary: 'var(--color-estuary)',
  hatch: 'color-mix(in oklab, var(--color-ink) 17%, transparent)',
  plate: 'color-mix(in oklab, var(--color-paper) 82%, transparent)',
  wash: 'color-mix(in oklab, var(--color-ochre) 16%, transparent)',
  envelope: 'color-mix(in oklab, var(--color-ink) 24%, transparent)',
  percentiles: 'color-mix(in oklab, var(--color-reed) 38%, transparent)',
};

/** Reads the theme's tokens where they hold: on an element of the page. */
export function readPalette(host: HTMLElement): Palette {
  const probe = document.createElement('span');
  probe.hidden = true;
  host.append(probe);
  const entries = Object.entries(SOURCES).map(([name, source]) => {
    probe.style.color = source;
    return [name, getComputedStyle(probe).color] as const;
  });
  probe.remove();
  return Object.fromEntries(entries) as Record<keyof Palette, string>;
}
