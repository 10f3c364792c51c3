import { type Span } from '#db/queries/exclusions';

export type { Span };

/** Spans that together cover the same time, ascending, disjoint and not adjoining. */
export function mergedSpans(spans: readonly Span[]): Span[] {
  const merged: Span[] = [];
  for (const span of [...spans].sort((a, b) => a.fromSec - b.fromSec)) {
    const last = merged.at(-1);
    if (last && span.fromSec <= last.toSec) last.toSec = Math.max(last.toSec, span.toSec);
    else merged.push({ ...span });
  }
  return merged;
}

/** Whether any of some merged spans overlaps `fromSec <= t < toSec`. */
export function overlapsAny(merged: readonly Span[], fromSec: number, toSec: number): boolean {
  let low = 0;
  let high = merged.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((merged[middle]?.toSec ?? Infinity) <= fromSec) low = middle + 1;
    else high = middle;
  }
  return (merged[low]?.fromSec ?? Infinity) < toSec;
}

/** What is left of `whole` without some spans, ascending. */
export function withoutSpans(whole: Span, spans: readonly Span[]): Span[] {
  const rest: Span[] = [];
  let fromSec = whole.fromSec;
  for (const span of mergedSpans(spans)) {
    if (span.fromSec > fromSec) rest.push({ fromSec, toSec: Math.min(span.fromSec, whole.toSec) });
    fromSec = Math.max(fromSec, span.toSec);
    if (fromSec >= whole.toSec) return rest;
  }
  rest.push({ fromSec, toSec: whole.toSec });
  return rest;
}

/** From the earliest beginning of some spans to their latest end. */
export function wholeOf(spans: readonly Span[]): Span {
  return {
    fromSec: Math.min(...spans.map(({ fromSec }) => fromSec)),
    toSec: Math.max(...spans.map(({ toSec }) => toSec)),
  };
}
