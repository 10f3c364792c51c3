import { existsSync, readdirSync, readFileSync } from 'node:fs';

/** Every page's address pattern, such as `/n/[network]/map`, read from the folder that makes them. */
export function pagePatterns(): string[] {
  return readdirSync('src/pages', { recursive: true, encoding: 'utf8' })
    .filter((file) => /\.(astro|ts)$/.test(file) && !file.startsWith('api/') && !/(^|\/)_/.test(file))
    .map((file) => `/${file.replace(/\.(astro|ts)$/, '').replace(/(^|\/)index$/, '')}`)
    .sort();
}

/** Whether a page takes forms. */
export function takesForms(pattern: string): boolean {
  const file = [`src/pages${pattern}.astro`, `src/pages${pattern}/index.astro`].find((name) =>
    existsSync(name),
  );
  return file !== undefined && readFileSync(file, 'utf8').includes("'POST'");
}

/** What stands in the place of each parameter of a page's address. */
export type Subjects = Record<string, string>;

/** The address of a page of a network; null where a parameter has no subject. */
export function addressOf(pattern: string, network: string, subjects: Subjects): string | null {
  const named = Object.entries(subjects).reduce(
    (address, [parameter, value]) =>
      address.replace(parameter, parameter.replace(/\[\w+\]/, encodeURIComponent(value))),
    pattern.replace('[network]', network),
  );
  return named.includes('[') ? null : named;
}
