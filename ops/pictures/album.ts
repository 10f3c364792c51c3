import { escapeHtml } from '#lib/format/escapeHtml';
import { type Picture } from './picture';

/** The pictures of one page. */
export interface Leaf {
  pattern: string;
  path: string;
  looker: string;
  pictures: Picture[];
}

export interface Album {
  takenAt: Date;
  leaves: Leaf[];
  /** Patterns without a picture, and why. */
  missing: string[];
}

/** A page that shows all pictures, those with faults marked. */
export function albumPage({ takenAt, leaves, missing }: Album): string {
  return `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<title>Pictures of Bittern</title>
<style>
body { font: 15px sans-serif; margin: 2rem; }
section { border-top: 1px solid #999; margin-top: 2rem; }
.row { display: flex; flex-wrap: wrap; gap: 1rem; align-items: start; }
figure { margin: 0; } img { border: 1px solid #999; max-height: 40rem; width: auto; max-width: 100%; }
.fault { color: #a02010; }
</style>
<h1>Pictures of Bittern</h1>
<p>${takenAt.toISOString()}</p>
${missing.length > 0 ? `<h2>Without a picture</h2><ul>${missing.map((one) => `<li>${escapeHtml(one)}</li>`).join('')}</ul>` : ''}
${leaves.map(leafSection).join('\n')}
</html>
`;
}

function leafSection({ pattern, path, looker, pictures }: Leaf): string {
  return `<section><h2>${escapeHtml(pattern)}</h2><p>${escapeHtml(path)}, seen by ${looker}</p><div class="row">
${pictures.map(figure).join('\n')}</div></section>`;
}

function figure({ file, theme, widthPx, faults }: Picture): string {
  const words = faults.map((fault) => `<br><span class="fault">${escapeHtml(fault)}</span>`).join('');
  const image = file === '' ? '' : `<a href="${file}"><img loading="lazy" src="${file}" alt=""></a>`;
  return `<figure>${image}
<figcaption>${theme}, ${widthPx} px${words}</figcaption></figure>`;
}
