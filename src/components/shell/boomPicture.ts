export const COLUMNS = 84;
export const ROWS = 14;
const STEPS = 12;

/** Columns at which the bittern booms, and the row (counted from the lowest band) it booms in. */
const BOOMS = [22, 29, 36, 57, 64];
const BOOM_ROW = 3;

/** A step of the ramp and the cells that take it, as one SVG path in units of a cell. */
export interface Shade {
  /** 0–1 along the level ramp. */
  share: number;
  path: string;
}

/** A spring night over the marsh as bands and hours: a hush, the bittern's low booms, birds before dawn. Drawn, not measured. */
export function boomPicture(): Shade[] {
  const paths = Array.from({ length: STEPS }, () => '');
  for (let row = 0; row < ROWS; row += 1) {
    for (let column = 0; column < COLUMNS; column += 1) {
      const step = Math.min(STEPS - 1, Math.floor(loudness(column, row) * STEPS));
      paths[step] += `M${column} ${ROWS - 1 - row}h1v1h-1z`;
    }
  }
  return paths.map((path, step) => ({ share: step / (STEPS - 1), path })).filter(({ path }) => path !== '');
}

function loudness(column: number, row: number): number {
  const bell = (distance: number, width: number) => Math.exp(-((distance / width) ** 2));
  const hush = 0.3 * bell(row, 7) + 0.08 * (grain(column, row) - 0.5) + 0.05 * Math.sin(column / 9);
  const boom = Math.max(
    ...BOOMS.map((at) => bell(column - at, 1.1) * (bell(row - BOOM_ROW, 0.9) + 0.25 * bell(row - 6, 1))),
  );
  const dawn = Math.max(0, (column - 66) / 18) * bell(row - 10, 2) * (0.35 + 0.4 * grain(column, row + 40));
  return Math.min(1, Math.max(0, hush + 0.62 * boom + dawn));
}

/** A repeatable grain, 0–1. */
function grain(column: number, row: number): number {
  const wave = Math.sin(column * 127.1 + row * 311.7) * 43758.5453;
  return wave - Math.floor(wave);
}
