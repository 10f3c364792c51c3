import { type Band } from '#lib/acoustics/bands';
import { barRange, barShare } from './spectrumScale';

/** A band of a spectrum with its level in dB, and what else is known about it. */
export interface SpectrumBar {
  band: Band;
  leqDb: number | null;
  /** Drawn as a stepped line above the bars. */
  l10Db?: number | null;
  /** What is usual: drawn as a dash of estuary blue across the bar. */
  usualDb?: number | null;
  /** Stands out: drawn in rust. */
  isStandingOut?: boolean;
  /** Marked by a selection: underlined. */
  isMarked?: boolean;
}

interface SpectrumBarsProps {
  bars: readonly SpectrumBar[];
  /** What the bars show, in a sentence, for those who do not see them. */
  summary: string;
  heightPx?: number;
}

const WIDTH = 260;
const FOOT_PX = 18;
const SCALE_PX = 24;
/** Bands that get a label: the octaves' every other mid-band. */
const isLabelled = (band: Band) => band.index % 6 === 0;

/** A spectrum as bars on the nominal frequencies, unweighted levels. */
export function SpectrumBars({ bars, summary, heightPx = 124 }: SpectrumBarsProps) {
  const range = barRange(
    bars.flatMap(({ leqDb, l10Db, usualDb }) => [leqDb, l10Db ?? null, usualDb ?? null]),
  );
  const plotHeight = heightPx - FOOT_PX;
  const step = (WIDTH - SCALE_PX) / Math.max(1, bars.length);
  const yOf = (levelDb: number) => plotHeight * (1 - barShare(range, levelDb));
  const left = (at: number) => SCALE_PX + at * step;
  return (
    <svg viewBox={`0 0 ${WIDTH} ${heightPx}`} role="img" aria-label={summary} className="block w-full">
      {[range.topDb, range.footDb].map((db) => (
        <text
          key={db}
          x={SCALE_PX - 5}
          y={db === range.topDb ? 9 : plotHeight}
          textAnchor="end"
          className={SMALL}
        >
          {db}
        </text>
      ))}
      <path d={`M${SCALE_PX} ${plotHeight + 0.5}H${WIDTH}`} className="stroke-line" />
      {bars.map(({ band, leqDb, usualDb, isStandingOut, isMarked }, at) => (
        <g key={band.index}>
          {leqDb !== null && (
            <rect
              x={left(at) + step * 0.08}
              width={step * 0.84}
              y={yOf(leqDb)}
              height={Math.max(0.5, plotHeight - yOf(leqDb))}
              className={isStandingOut ? 'fill-rust' : 'fill-ink-soft/55'}
            />
          )}
          {usualDb !== null && usualDb !== undefined && (
            <path
              d={`M${left(at)} ${yOf(usualDb).toFixed(1)}h${step}`}
              className="stroke-estuary"
              strokeWidth="2.2"
            />
          )}
          {isMarked && (
            <rect x={left(at)} width={step} y={plotHeight + 1} height={2.5} className="fill-estuary" />
          )}
          {isLabelled(band) && (
            <text x={left(at) + step / 2} y={heightPx - 2} textAnchor="middle" className={SMALL}>
              {band.nominalHz < 1000 ? band.nominalHz : `${band.nominalHz / 1000}k`}
            </text>
          )}
        </g>
      ))}
      <path d={stepPath(bars, left, step, yOf)} fill="none" className="stroke-ink" strokeWidth="1.1" />
    </svg>
  );
}

const SMALL = 'fill-ink-soft text-[12px]';

/** A stepped line through the bars' L10; broken where a band has none. */
function stepPath(
  bars: readonly SpectrumBar[],
  left: (at: number) => number,
  step: number,
  yOf: (levelDb: number) => number,
): string {
  let isDrawing = false;
  return bars
    .map(({ l10Db }, at) => {
      if (l10Db === null || l10Db === undefined) {
        isDrawing = false;
        return '';
      }
      const part = `${isDrawing ? 'V' : `M${left(at)} `}${yOf(l10Db).toFixed(1)}H${(left(at) + step).toFixed(1)}`;
      isDrawing = true;
      return part;
    })
    .join('');
}
