import { type Run } from './runs';
import { endOfColumnsSec, type StripColumns } from './stripColumns';

/** A stretch of time and the layer that shows it. */
export interface VisiblePart {
  columns: StripColumns;
  within: Run;
}

/** Stretches of `run`, in order of time, each with the first layer of the list that holds it; those that none holds are left out. */
export function visibleParts(layers: readonly StripColumns[], run: Run): VisiblePart[] {
  const edges = new Set([run.fromSec, run.toSec]);
  for (const layer of layers) {
    for (const edge of [layer.fromSec, endOfColumnsSec(layer)]) {
      if (edge > run.fromSec && edge < run.toSec) edges.add(edge);
    }
  }
  const ordered = [...edges].sort((a, b) => a - b);
  return ordered.slice(1).flatMap((toSec, at) => {
    const fromSec = ordered[at] ?? toSec;
    const columns = layers.find((l) => l.fromSec <= fromSec && toSec <= endOfColumnsSec(l));
    return columns ? [{ columns, within: { fromSec, toSec } }] : [];
  });
}
