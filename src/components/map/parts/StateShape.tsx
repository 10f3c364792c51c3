import { type MarkState } from '../model/stationWords';

const COLOUR: Record<MarkState, string> = {
  live: 'text-reed',
  'over-limit': 'text-rust',
  silent: 'text-ochre-text',
  awaiting: 'text-ink-soft',
  retired: 'text-ink-soft',
};

interface StateShapeProps {
  state: MarkState;
  sizePx?: number;
}

/** A shape for each state, so that it is told without colour: disc, triangle, diamond, dashed ring, bar. */
export function StateShape({ state, sizePx = 12 }: StateShapeProps) {
  return (
    <svg
      className={`shrink-0 ${COLOUR[state]}`}
      viewBox="-1 -1 12 12"
      width={sizePx}
      height={sizePx}
      aria-hidden="true"
    >
      <ShapePath state={state} />
    </svg>
  );
}

function ShapePath({ state }: { state: MarkState }) {
  switch (state) {
    case 'live':
      return <circle cx="5" cy="5" r="4.2" fill="currentColor" className="stroke-paper" />;
    case 'over-limit':
      return (
        <path d="M5 0 10.4 9.6H-.4z" fill="currentColor" className="stroke-paper" strokeLinejoin="round" />
      );
    case 'silent':
      return (
        <path d="M5 .6 9.4 5 5 9.4.6 5z" className="fill-paper" stroke="currentColor" strokeWidth="1.7" />
      );
    case 'awaiting':
      return (
        <circle
          cx="5"
          cy="5"
          r="3.9"
          className="fill-paper"
          stroke="currentColor"
          strokeWidth="1.4"
          strokeDasharray="2 1.6"
        />
      );
    case 'retired':
      return <path d="M1 5h8" stroke="currentColor" strokeWidth="2" />;
  }
}
