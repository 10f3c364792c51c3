import { createHash } from 'node:crypto';
import loadDirective from 'astro/runtime/client/load.prebuilt.js';
import onlyDirective from 'astro/runtime/client/only.prebuilt.js';
import island from 'astro/runtime/server/astro-island.prebuilt.js';
import { EARLY_SCRIPT } from '#components/strip/early/earlyScript.ts';

/**
 * Every script that stands in a page itself instead of a file: what wakes islands (`client:only` and `client:load`), and what asks for the strip's first
 * columns. The build keeps all others in files (astro.config.mjs).
 */
const INLINE_SCRIPTS = [island, loadDirective, onlyDirective, EARLY_SCRIPT];

/** A script's source for a policy: its SHA-256, so that exactly this text may run. */
export function scriptHash(script: string): string {
  return `'sha256-${createHash('sha256').update(script).digest('base64')}'`;
}

/**
 * What a page may load and run (Content Security Policy, level 3), by directive. Scripts are our own files and the known texts in
 * pages. Styles may stand in attributes: charts and the map place things by them. `mapOrigins`: where map data come from.
 */
export function contentSecurityPolicy(mapOrigins: readonly string[]): Record<string, string[]> {
  return {
    defaultSrc: ["'self'"],
    scriptSrc: ["'self'", ...INLINE_SCRIPTS.map(scriptHash)],
    scriptSrcAttr: ["'none'"],
    styleSrc: ["'self'", "'unsafe-inline'"],
    imgSrc: ["'self'", 'data:', 'blob:', ...mapOrigins],
    fontSrc: ["'self'", 'data:'],
    connectSrc: ["'self'", ...mapOrigins],
    workerSrc: ["'self'"],
    baseUri: ["'none'"],
    formAction: ["'self'"],
    frameAncestors: ["'none'"],
    objectSrc: ["'none'"],
  };
}
