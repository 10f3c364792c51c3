/** A station's place on the screen, CSS pixels. */
export interface SlipPoint {
  id: string;
  x: number;
  y: number;
}

export interface Size {
  width: number;
  height: number;
}

/** A slip for one station, or for several that lie too close together for one each. */
export interface PlacedSlip {
  ids: string[];
  /** The place it speaks for: the station's, or the first station's of several. */
  pointX: number;
  pointY: number;
  /** Top left corner of the slip. */
  x: number;
  y: number;
}

/** Room kept between two slips, and around the dot that marks a station's place. */
const GAP_PX = 4;
const DOT_PX = 7;

/**
 * Directions to try from a station's place, then the same farther out; where it stands away from the place a leader line
 * joins them.
 */
const DIRECTIONS = [
  [0, -1],
  [1, -1],
  [-1, -1],
  [1, 0],
  [-1, 0],
  [0, 1],
  [1, 1],
  [-1, 1],
] as const;
const RINGS = [1, 1.5, 2, 2.6, 3.3];

/**
 * Places a slip for each station so that none lies on another or on another's dot. A station that finds no room is taken into
 * the slip of the nearest one that did. The same points, moved together, give the same arrangement; with a `frame`, slips keep
 * within it where they can. They also keep off the points to `avoid`.
 */
export function placeSlips(
  points: readonly SlipPoint[],
  slip: Size,
  frame?: Size,
  avoid: readonly SlipPoint[] = [],
): PlacedSlip[] {
  const placed: PlacedSlip[] = [];
  const dots = [...points, ...avoid];
  // Nothing farther away can be in the way of any of a point's spots.
  const reach = { width: reachOf(slip.width), height: reachOf(slip.height) };
  for (const point of points) {
    const spots = candidates(point, slip);
    const near = <T extends { x: number; y: number }>(others: readonly T[]) =>
      others.filter(
        ({ x, y }) => Math.abs(x - point.x) < reach.width && Math.abs(y - point.y) < reach.height,
      );
    const [nearSlips, nearDots] = [near(placed), near(dots)];
    const isInFrame = (spot: Spot) => frame !== undefined && isInside(spot, slip, frame);
    let free: Spot | undefined;
    for (const spot of spots) {
      // One outside the frame is only a stopgap.
      if ((free && !isInFrame(spot)) || !isFree(spot, slip, nearSlips, nearDots, point)) continue;
      free = spot;
      if (!frame || isInFrame(spot)) break;
    }
    const host = free ? undefined : nearest(placed, point);
    // The very first one is placed even on others' dots: they are taken into its slip.
    const spot = free ?? (host ? undefined : spots[0]);
    if (spot) placed.push({ ids: [point.id], pointX: point.x, pointY: point.y, ...spot });
    else host?.ids.push(point.id);
  }
  return placed;
}

/** Farthest from a point, along one side, that a slip or a dot can lie and be in the way of one of its spots. */
function reachOf(sidePx: number): number {
  const farthestRing = Math.max(...RINGS) * (sidePx / 2 + DOT_PX + GAP_PX);
  return farthestRing + 1.5 * sidePx + DOT_PX + GAP_PX;
}

function isInside({ x, y }: Spot, slip: Size, frame: Size): boolean {
  return x >= 0 && y >= 0 && x + slip.width <= frame.width && y + slip.height <= frame.height;
}

interface Spot {
  x: number;
  y: number;
}

function candidates(point: SlipPoint, slip: Size): Spot[] {
  return RINGS.flatMap((ring) =>
    DIRECTIONS.map(([dx, dy]) => ({
      x: point.x - slip.width / 2 + dx * ring * (slip.width / 2 + DOT_PX + GAP_PX),
      y: point.y - slip.height / 2 + dy * ring * (slip.height / 2 + DOT_PX + GAP_PX),
    })),
  );
}

function isFree(
  spot: Spot,
  slip: Size,
  placed: readonly PlacedSlip[],
  points: readonly SlipPoint[],
  own: SlipPoint,
): boolean {
  const isOnSlip = placed.some(
    (other) =>
      Math.abs(other.x - spot.x) < slip.width + GAP_PX && Math.abs(other.y - spot.y) < slip.height + GAP_PX,
  );
  return !isOnSlip && points.every((point) => point === own || !isOnDot(spot, slip, point));
}

function isOnDot(spot: Spot, slip: Size, point: SlipPoint): boolean {
  return (
    point.x > spot.x - DOT_PX &&
    point.x < spot.x + slip.width + DOT_PX &&
    point.y > spot.y - DOT_PX &&
    point.y < spot.y + slip.height + DOT_PX
  );
}

function nearest(placed: readonly PlacedSlip[], { x, y }: SlipPoint): PlacedSlip | undefined {
  const distance = (slip: PlacedSlip) => (slip.pointX - x) ** 2 + (slip.pointY - y) ** 2;
  return [...placed].sort((a, b) => distance(a) - distance(b))[0];
}
