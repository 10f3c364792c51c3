import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type LastDay } from '../hooks/useLastDay';
import { levelTicks, pxOfLevel, traceRange } from '../../strip/model/levelAxis';
import { timeTicks } from '../../strip/model/timeTicks';
import { pxAtSec } from '../../strip/model/timeView';

interface SparklineProps {
  day: LastDay;
  zone: string;
  summary: string;
}

const WIDTH = 280;
const HEIGHT = 96;
const LEFT = 26;
const PLOT_WIDTH = WIDTH - LEFT - 2;

/** The LAeq of each quarter-hour of a day as a stepped line; where there is none the ground is hatched. */
export function Sparkline({ day, zone, summary }: SparklineProps) {
  const { columns } = day;
  const range = traceRange([columns.laeqCentiDb], []);
  const x = (sec: number) => LEFT + Math.min(PLOT_WIDTH, Math.max(0, pxAtSec(day, PLOT_WIDTH, sec)));
  const steps = Array.from(columns.laeqCentiDb, (centiDb, at) => {
    const fromSec = columns.fromSec + at * columns.stepSec;
    return { centiDb, left: x(fromSec), right: x(Math.min(fromSec + columns.stepSec, day.toSec)), fromSec };
  }).filter(({ left, right }) => right > left);
  const y = (centiDb: number) => pxOfLevel(range, HEIGHT, centiDb / 100);
  return (
    <svg viewBox={`0 0 ${WIDTH} ${HEIGHT + 20}`} role="img" aria-label={summary} className="block w-full">
      <defs>
        <pattern
          id="no-data"
          width="5"
          height="5"
          patternUnits="userSpaceOnUse"
          patternTransform="rotate(45)"
        >
          <path d="M0 0V5" className="stroke-ink/30" />
        </pattern>
      </defs>
      {levelTicks(range, HEIGHT, 20).map((db) => (
        <g key={db}>
          <path d={`M${LEFT} ${y(db * 100)}H${WIDTH}`} className="stroke-line" />
          <text x={LEFT - 5} y={y(db * 100) + 4} textAnchor="end" className="fill-ink-soft text-[12px]">
            {db}
          </text>
        </g>
      ))}
      {steps
        .filter(({ centiDb }) => centiDb === NO_LEVEL_CENTI_DB)
        .map(({ left, right }) => (
          <rect key={left} x={left} width={right - left} y="0" height={HEIGHT} fill="url(#no-data)" />
        ))}
      <path d={linePath(steps, y)} fill="none" className="stroke-ink" strokeWidth="1.3" />
      {timeTicks(day, 170, zone).map(({ sec, label, kind }) => (
        <text
          key={sec}
          x={x(sec)}
          y={HEIGHT + 15}
          textAnchor={x(sec) > WIDTH - 16 ? 'end' : 'middle'}
          className="fill-ink-soft text-[12px]"
        >
          {kind === 'day' ? label.slice(0, 3) : label}
        </text>
      ))}
    </svg>
  );
}

function linePath(
  steps: readonly { centiDb: number; left: number; right: number }[],
  y: (centiDb: number) => number,
): string {
  let isDrawing = false;
  return steps
    .map(({ centiDb, left, right }) => {
      if (centiDb === NO_LEVEL_CENTI_DB) {
        isDrawing = false;
        return '';
      }
      const start = isDrawing ? 'V' : `M${left.toFixed(1)} `;
      isDrawing = true;
      return `${start}${y(centiDb).toFixed(1)}H${right.toFixed(1)}`;
    })
    .join('');
}
