const BROWSERS: readonly (readonly [mark: RegExp, name: string])[] = [
  [/\bEdg(?:e|A|iOS)?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\b(?:Firefox|FxiOS)\//, 'Firefox'],
  [/\b(?:Chrome|CriOS|HeadlessChrome)\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
];

const SYSTEMS: readonly (readonly [mark: RegExp, name: string])[] = [
  [/\biPhone\b/, 'iPhone'],
  [/\biPad\b/, 'iPad'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b/, 'macOS'],
  [/\bLinux\b/, 'Linux'],
];

const LONGEST_OTHER = 60;

/** "Firefox on Linux" of what a browser says it is; of a program its own words; null where nothing was said. */
export function agentWords(agent: string | null): string | null {
  if (!agent) return null;
  const browser = nameIn(BROWSERS, agent);
  const system = nameIn(SYSTEMS, agent);
  if (!browser) return agent.slice(0, LONGEST_OTHER);
  return system ? `${browser} on ${system}` : browser;
}

function nameIn(known: typeof BROWSERS, agent: string): string | undefined {
  return known.find(([mark]) => mark.test(agent))?.[1];
}
