import { formatDifferenceDb } from './levels';
import { formatInstantShort } from './times';

interface PlacementSpan {
  to: string;
  placement: 'free-field' | 'facade';
  /** dB. */
  correction: number;
}

/** Stretches of a period in order of time: "free field until 3 March 10:00, then at a façade". */
export function stretchWords<T extends { to: string }>(
  spans: readonly T[],
  zone: string,
  wordsOf: (span: T) => string,
): string {
  return spans
    .map((span, at) =>
      at === spans.length - 1
        ? wordsOf(span)
        : `${wordsOf(span)} until ${formatInstantShort(Date.parse(span.to) / 1000, zone)}`,
    )
    .join(', then ');
}

/** How a microphone stood: "Façade (levels as measured; −3.0 dB for incident sound)". */
export function placementsText(spans: readonly PlacementSpan[], zone: string): string {
  return stretchWords(spans, zone, ({ placement, correction }) =>
    placement === 'facade'
      ? `Façade (levels as measured; ${formatDifferenceDb(correction)} dB for incident sound)`
      : 'Free field',
  );
}
