/** A descriptor ready to be set: a symbol and what stands below the line beside it. */
export interface DescriptorParts {
  symbol: string;
  subscript: string;
}

/** A stretch of text: plain, or a descriptor to be typeset. */
export type TextRun = string | DescriptorParts;

const DESCRIPTOR =
  /\bL(?:Aeq|Ceq|Zeq|eq|AFmax|AFmin|Fmax|Cpeak|AE|den|dn|day|evening|night|A?(?:1|5|10|50|90|95|99)(?!\d))(?:24h|,(?:[\d.]+ (?:s|min|h)(?: \d+ min)?|\d\d:\d\d–\d\d:\d\d|day|evening|night))?(?![A-Za-z])/g;

/**
 * Takes a descriptor's plain name apart for typesetting. `name` is as the interface writes it: LAeq, LAFmax, Lden, LA10, L90,
 * LAeq24h; `window` is the averaging time in words ("15 min") and follows a comma.
 */
export function descriptorParts(name: string, window?: string): DescriptorParts {
  const body = name.startsWith('L') ? name.slice(1).replace(/24h$/, ',24 h') : '';
  const subscript = window ? `${body},${window}` : body;
  return name.startsWith('L')
    ? { symbol: 'L', subscript: spaced(subscript) }
    : { symbol: name, subscript: '' };
}

/** The plain form, for CSV, e-mail and titles: "LAeq,15 min". */
export function descriptorText(name: string, window?: string): string {
  const { symbol, subscript } = descriptorParts(name, window);
  return `${symbol}${subscript}`.replaceAll('\u00a0', ' ');
}

/** A text cut at its descriptors, so that "LAeq,1 h above 55 dB" can be typeset. */
export function typesetRuns(text: string): TextRun[] {
  const runs: TextRun[] = [];
  let done = 0;
  for (const match of text.matchAll(DESCRIPTOR)) {
    const [found] = match;
    if (match.index > done) runs.push(text.slice(done, match.index));
    runs.push(descriptorParts(found));
    done = match.index + found.length;
  }
  if (done < text.length) runs.push(text.slice(done));
  return runs;
}

/** An averaging time does not break across lines. */
function spaced(subscript: string): string {
  return subscript.replaceAll(' ', '\u00a0');
}
