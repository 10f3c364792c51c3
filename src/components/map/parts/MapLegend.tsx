import { levelColour, type Theme } from '#lib/format/levelRamp';
import { MAP_LEVEL_RANGE } from '../model/levelRange';
import { type MarkState } from '../model/stationWords';
import { StateShape } from './StateShape';

const PAST_STATES: readonly (readonly [MarkState, string])[] = [
  ['live', 'measured'],
  ['over-limit', 'in a window over a limit'],
  ['silent', 'no valid data'],
];
const STATES: readonly (readonly [MarkState, string])[] = [
  ['live', 'live'],
  ['over-limit', 'over a limit in the last hour'],
  ['silent', 'silent'],
  ['awaiting', 'no post yet'],
];

/** What the marks' shapes and the slips' colours mean. */
export function MapLegend({ theme, isPast }: { theme: Theme; isPast: boolean }) {
  const { lowDb, highDb } = MAP_LEVEL_RANGE;
  const steps = Array.from({ length: 12 }, (_, n) => lowDb + (n * (highDb - lowDb)) / 11);
  return (
    <div className="mt-2 flex flex-wrap items-center gap-x-4 gap-y-1 text-small text-ink-soft">
      {(isPast ? PAST_STATES : STATES).map(([state, words]) => (
        <span key={state} className="flex items-center gap-1.5">
          <StateShape state={state} /> {words}
        </span>
      ))}
      <span className="flex items-center gap-1.5 tabular-nums">
        {lowDb}
        <span aria-hidden="true" className="flex h-2.5 w-24 border border-line">
          {steps.map((db) => (
            <span key={db} className="grow" style={{ background: levelColour(db, MAP_LEVEL_RANGE, theme) }} />
          ))}
        </span>
        {highDb} dB
      </span>
      {isPast && <span>%: valid share of the quarter-hour</span>}
    </div>
  );
}
