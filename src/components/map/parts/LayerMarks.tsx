import { type LayerMark, complaintsWords, windWords } from '../model/layerMarks';
import { type PlacedSlip, type Size, type SlipPoint } from '../model/placeSlips';
import { SLIP_SIZE } from '../model/slipSize';

interface LayerMarksProps {
  slug: string;
  marks: readonly LayerMark[];
  /** Where each mark lies on the map, CSS pixels. */
  points: readonly SlipPoint[];
  slips: readonly PlacedSlip[];
}

const WIND_SIZE = { width: 76, height: 22 };
const COMPLAINTS_SIZE = { width: 30, height: 24 };
/** A station's wind stands under its mark. */
const BELOW_STATION_PX = 20;

/** Wind and complaints on the map. The lists beside it say the same in words. */
export function LayerMarks({ slug, marks, points, slips }: LayerMarksProps) {
  return placed(marks, points, slips).map(({ mark, box }) =>
    mark.kind === 'wind' ? (
      <span
        key={mark.id}
        aria-hidden="true"
        title={`${mark.wind.name}: ${windWords(mark.wind)}`}
        className="absolute flex items-center justify-center gap-1 rounded-full border border-line bg-raised/90 text-[12px] whitespace-nowrap text-ink tabular-nums"
        style={styleOf(box)}
      >
        <WindArrow fromDeg={mark.wind.direction} />
        {mark.wind.speed.toFixed(1)} m/s
      </span>
    ) : (
      <a
        key={mark.id}
        href={complaintsHref(slug, mark.references)}
        aria-label={complaintsWords(mark.references.length)}
        title={complaintsWords(mark.references.length)}
        className="pointer-events-auto absolute grid place-items-center text-[12px] font-medium text-paper no-underline"
        style={styleOf(box)}
      >
        <svg viewBox="0 0 30 24" className="absolute inset-0 fill-estuary stroke-paper" aria-hidden="true">
          <path d="M3 1h24q2 0 2 2v12q0 2-2 2H17l-5 6v-6H3q-2 0-2-2V3q0-2 2-2z" />
        </svg>
        <span className="relative -mt-1.5">{mark.references.length}</span>
      </a>
    ),
  );
}

/** Points that slips keep off: along masts' winds and complaints. */
export function dotsOfMarks(marks: readonly LayerMark[], points: readonly SlipPoint[]): SlipPoint[] {
  return marks.flatMap((mark, at) => {
    const point = points[at];
    if (!point || isOfStation(mark)) return [];
    const reach = mark.kind === 'wind' ? WIND_SIZE.width / 2 - 6 : COMPLAINTS_SIZE.width / 2 - 6;
    return [-reach, 0, reach].map((dx) => ({ ...point, x: point.x + dx }));
  });
}

/** An arrow that flies with the wind; a ring where nobody tells its direction. */
export function WindArrow({ fromDeg }: { fromDeg: number | null }) {
  return (
    <svg viewBox="-8 -8 16 16" width="14" height="14" className="shrink-0 stroke-ink" aria-hidden="true">
      {fromDeg === null ? (
        <circle r="4" fill="none" strokeWidth="1.6" />
      ) : (
        <path
          d="M0-7V6M-4 1.5 0 6.5 4 1.5"
          fill="none"
          strokeWidth="1.8"
          strokeLinejoin="round"
          transform={`rotate(${fromDeg})`}
        />
      )}
    </svg>
  );
}

interface Box extends Size {
  x: number;
  y: number;
}

/** Marks in order; a station's wind that would lie on a slip or on another mark is left to the list. */
function placed(marks: readonly LayerMark[], points: readonly SlipPoint[], slips: readonly PlacedSlip[]) {
  const taken: Box[] = slips.map(({ x, y }) => ({ x, y, ...SLIP_SIZE }));
  return marks.flatMap((mark, at) => {
    const point = points[at];
    if (!point) return [];
    const box = boxOf(mark, point);
    if (isOfStation(mark) && taken.some((other) => overlaps(box, other))) return [];
    taken.push(box);
    return [{ mark, box }];
  });
}

function boxOf(mark: LayerMark, { x, y }: SlipPoint): Box {
  const size = mark.kind === 'wind' ? WIND_SIZE : COMPLAINTS_SIZE;
  const below = isOfStation(mark) ? BELOW_STATION_PX : 0;
  return { x: x - size.width / 2, y: y - size.height / 2 + below, ...size };
}

function isOfStation(mark: LayerMark): boolean {
  return mark.kind === 'wind' && mark.wind.source === 'station';
}

function overlaps(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}

function styleOf({ x, y, width, height }: Box) {
  return { left: x, top: y, width, height };
}

function complaintsHref(slug: string, [only, ...others]: readonly string[]): string {
  const list = `/n/${slug}/complaints`;
  return only !== undefined && others.length === 0 ? `${list}/${encodeURIComponent(only)}` : list;
}
