import { formatLevelDb } from '#lib/format/levels';
import { levelColour, type Theme } from '#lib/format/levelRamp';
import { MAP_LEVEL_RANGE } from '../model/levelRange';
import { type PlacedSlip, type Size, type SlipPoint } from '../model/placeSlips';
import { useSlips } from '../hooks/useSlips';
import { type LayerMark } from '../model/layerMarks';
import { type ShownStation } from '../model/shownStation';
import {
  absenceWords,
  exceedanceWords,
  markStateOf,
  slipNote,
  stationSentence,
  type MarkState,
} from '../model/stationWords';
import { dotsOfMarks, LayerMarks } from './LayerMarks';
import { SLIP_SIZE } from '../model/slipSize';
import { StateShape } from './StateShape';
import { type StationChoice } from './StationList';

const DOT_PX = 14;

interface SlipLayerProps {
  stations: readonly ShownStation[];
  /** Size of the map, CSS pixels. */
  frame: Size;
  /** Where each station lies on it. */
  points: readonly SlipPoint[];
  marks: readonly LayerMark[];
  /** Where each mark lies on it. */
  markPoints: readonly SlipPoint[];
  slug: string;
  choice: StationChoice;
  theme: Theme;
  zone: string;
  nowSec: number;
  /** Shows the stations that one slip stands for: zooms in. */
  onSpread: (codes: string[]) => void;
}

/** Slips with current levels, lines from those that had to step aside, and the marks of the stations themselves. */
export function SlipLayer(props: SlipLayerProps) {
  const { stations, points, choice } = props;
  const byCode = new Map(stations.map((station) => [station.code, station]));
  const avoid = dotsOfMarks(props.marks, props.markPoints);
  const slips = useSlips({ points, frame: props.frame, avoid }, SLIP_SIZE);
  return (
    <div className="pointer-events-none absolute inset-0 overflow-hidden">
      <svg className="absolute inset-0 size-full" aria-hidden="true">
        {slips.map((slip) => (
          <path key={slip.ids[0]} d={leaderPath(slip)} className="stroke-ink/60" fill="none" />
        ))}
      </svg>
      <LayerMarks slug={props.slug} marks={props.marks} points={props.markPoints} slips={slips} />
      {points.map(({ id, x, y }) => {
        const station = byCode.get(id);
        return (
          station && (
            <span key={id} className="absolute" style={{ left: x - DOT_PX / 2, top: y - DOT_PX / 2 }}>
              <StateShape state={markStateOf(station)} sizePx={DOT_PX} />
            </span>
          )
        );
      })}
      {slips.map((slip) => {
        const [code = ''] = slip.ids;
        const station = byCode.get(code);
        if (!station) return null;
        return slip.ids.length > 1 ? (
          <GroupSlip
            key={code}
            slip={slip}
            stations={slip.ids.flatMap((id) => byCode.get(id) ?? [])}
            onSpread={props.onSpread}
          />
        ) : (
          <Slip key={code} {...props} slip={slip} station={station} isActive={choice.active === code} />
        );
      })}
    </div>
  );
}

interface SlipProps extends SlipLayerProps {
  slip: PlacedSlip;
  station: ShownStation;
  isActive: boolean;
}

function Slip({ slip, station, choice, theme, zone, nowSec, isActive }: SlipProps) {
  const { latest, code } = station;
  const isLive = station.state === 'live' && latest !== null;
  return (
    <button
      type="button"
      aria-label={stationSentence(station, zone, nowSec)}
      aria-pressed={choice.chosen === code}
      onClick={() => choice.onChoose(code)}
      onPointerEnter={() => choice.onActive(code)}
      onPointerLeave={() => choice.onActive(null)}
      onFocus={() => choice.onActive(code)}
      onBlur={() => choice.onActive(null)}
      className={`${SLIP} ${markStateOf(station) === 'over-limit' ? 'border-rust' : ''} ${isActive ? 'z-10 border-ink' : ''} aria-pressed:border-estuary aria-pressed:outline-2 aria-pressed:outline-estuary`}
      style={{ left: slip.x, top: slip.y, ...SLIP_SIZE }}
    >
      <span
        className={`w-1.5 shrink-0 self-stretch ${isLive ? '' : 'hatch'}`}
        style={isLive ? { background: levelColour(latest.LAeq, MAP_LEVEL_RANGE, theme) } : undefined}
      />
      <span className="min-w-0 grow px-1.5 text-left leading-tight">
        {isLive ? (
          <>
            <span
              className={`text-body font-medium ${station.past?.meetsMinimum === false ? 'text-ochre-text' : ''}`}
            >
              {formatLevelDb(latest.LAeq)}
            </span>
            <span className="ml-1 text-[12px] text-ink-soft">dB</span>
          </>
        ) : (
          <span className="font-medium text-ochre-text">{absenceWords(station)}</span>
        )}
        <span className="block truncate text-[12px] text-ink-soft">
          {code}
          {isLive && ` · ${slipNote(station)}`}
        </span>
      </span>
      {station.exceedances ? (
        <span
          title={exceedanceWords(station) ?? undefined}
          className="absolute top-0.5 right-0.5 rounded-slight bg-rust px-1 text-[12px] leading-4 font-medium text-paper"
        >
          {station.exceedances}
        </span>
      ) : null}
    </button>
  );
}

const SLIP =
  'pointer-events-auto absolute flex items-center overflow-hidden rounded-slight border border-edge bg-raised text-table tabular-nums text-ink';

interface GroupSlipProps {
  slip: PlacedSlip;
  stations: readonly ShownStation[];
  onSpread: (codes: string[]) => void;
}

/** One slip for several stations that lie too close for one each; it tells the one that most needs a person. */
function GroupSlip({ slip, stations, onSpread }: GroupSlipProps) {
  const states = stations.map(markStateOf);
  const worst = URGENCY.find((state) => states.includes(state)) ?? 'live';
  const words = `${stations.length} stations: ${stations.map(({ name }) => name).join(', ')}. Zoom in to tell them apart.`;
  return (
    <button
      type="button"
      aria-label={words}
      title={words}
      onClick={() => onSpread(slip.ids)}
      className={`${SLIP} justify-center gap-1.5 font-medium ${worst === 'over-limit' ? 'border-rust' : ''}`}
      style={{ left: slip.x, top: slip.y, ...SLIP_SIZE }}
    >
      <StateShape state={worst} /> {stations.length} stations
    </button>
  );
}

const URGENCY: readonly MarkState[] = ['over-limit', 'silent', 'awaiting', 'live'];

/** From the station's place to the nearest point of its slip. */
function leaderPath({ pointX, pointY, x, y }: PlacedSlip): string {
  const toX = Math.min(x + SLIP_SIZE.width - 4, Math.max(x + 4, pointX));
  const toY = Math.min(y + SLIP_SIZE.height, Math.max(y, pointY));
  return `M${pointX} ${pointY}L${toX} ${toY}`;
}
