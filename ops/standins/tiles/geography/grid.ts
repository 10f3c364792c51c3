import type { Point } from './plane';

const FINE_M = 12;

/** Grid lines: 12 m apart over the estuary, further and further apart towards the open sea. */
export function gridLines(fineFromM: number, fineToM: number, edgeM: number): number[] {
  const outward = (fromM: number, sign: 1 | -1) => {
    const lines: number[] = [];
    for (
      let at = fromM, stepM = 13;
      Math.abs(at) < edgeM;
      stepM = Math.min(Math.max(800, Math.abs(at) / 8), stepM * 1.06)
    ) {
      at += sign * stepM;
      lines.push(at);
    }
    return lines;
  };
  const fine = Array.from(
    { length: Math.ceil((fineToM - fineFromM) / FINE_M) + 1 },
    (_, index) => fineFromM + index * FINE_M,
  );
  return [...outward(fineFromM, -1).reverse(), ...fine, ...outward(fineToM, 1)];
}

export function firstAtLeast(lines: number[], value: number): number {
  let low = 0;
  let high = lines.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((lines[middle] ?? Infinity) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Marks in `mask` the grid crossings that lie in an odd number of the rings (even-odd along each row). */
export function mark(
  mask: Uint8Array,
  rings: readonly (readonly Point[])[],
  eastM: number[],
  northM: number[],
): void {
  const norths = rings.flat().map(([, y]) => y);
  const [south, north] = norths.reduce(
    ([low, high], y) => [Math.min(low, y), Math.max(high, y)],
    [1e9, -1e9],
  );
  const lastRow = firstAtLeast(northM, north);
  for (let row = firstAtLeast(northM, south); row < lastRow; row += 1) {
    const crossings = rings.flatMap((ring) => crossingsAt(ring, northM[row] ?? 0)).sort((a, b) => a - b);
    for (let pair = 0; pair + 1 < crossings.length; pair += 2) {
      const from = firstAtLeast(eastM, crossings[pair] ?? 0);
      const to = firstAtLeast(eastM, crossings[pair + 1] ?? 0);
      mask.fill(1, row * eastM.length + from, row * eastM.length + to);
    }
  }
}

/** How far east a ring crosses a line of equal north. */
function crossingsAt(ring: readonly Point[], y: number): number[] {
  const crossings: number[] = [];
  let b = ring[ring.length - 1];
  for (const a of ring) {
    if (b && a[1] > y !== b[1] > y) crossings.push(a[0] + ((y - a[1]) / (b[1] - a[1])) * (b[0] - a[0]));
    b = a;
  }
  return crossings;
}

/** Distance to the nearest marked crossing by two sweeps over the grid (a chamfer distance; within some per cent). */
export function distanceTo(mask: Uint8Array, eastM: number[], northM: number[]): Float64Array {
  const columns = eastM.length;
  const rows = northM.length;
  const distance = Float64Array.from(mask, (isMarked) => (isMarked ? 0 : 1e9));
  const relax = (column: number, row: number, c2: number, r2: number) => {
    if (c2 < 0 || r2 < 0 || c2 >= columns || r2 >= rows) return;
    const stepM = Math.hypot((eastM[column] ?? 0) - (eastM[c2] ?? 0), (northM[row] ?? 0) - (northM[r2] ?? 0));
    const at = row * columns + column;
    distance[at] = Math.min(distance[at] ?? 1e9, (distance[r2 * columns + c2] ?? 1e9) + stepM);
  };
  for (const sign of [1, -1]) {
    for (let i = 0; i < rows; i += 1) {
      const row = sign === 1 ? i : rows - 1 - i;
      for (let j = 0; j < columns; j += 1) {
        const column = sign === 1 ? j : columns - 1 - j;
        relax(column, row, column - sign, row);
        relax(column, row, column, row - sign);
        relax(column, row, column - sign, row - sign);
        relax(column, row, column + sign, row - sign);
      }
    }
  }
  return distance;
}
