import { existsSync, readFileSync } from 'node:fs';

interface Chunk {
  file: string;
  imports?: string[];
}

/** What the build tells of its scripts, by their sources; nothing while developing. */
const MANIFEST = 'dist/client/.vite/manifest.json';
const RENDERER = '@astrojs/react/dist/client.js';

let chunks: Record<string, Chunk> | undefined;

/** Addresses of all scripts that islands need, with what makes them live; `sources`: ends of the paths of their components. */
export function islandScripts(...sources: string[]): string[] {
  return scriptsOf(...sources, RENDERER);
}

/**
 * Addresses of all scripts that some sources need (ends of their paths), so that a page can have them fetched at once: found one
 * behind the other, each waits until the page has time for the one before.
 */
export function scriptsOf(...sources: string[]): string[] {
  chunks ??= existsSync(MANIFEST)
    ? (JSON.parse(readFileSync(MANIFEST, 'utf8')) as Record<string, Chunk>)
    : {};
  const all = chunks;
  const files = new Set<string>();
  const add = (name: string) => {
    const chunk = all[name];
    if (!chunk || files.has(chunk.file)) return;
    files.add(chunk.file);
    chunk.imports?.forEach(add);
  };
  Object.keys(all)
    .filter((name) => sources.some((source) => name.endsWith(source)))
    .forEach(add);
  return [...files].map((file) => `/${file}`);
}
