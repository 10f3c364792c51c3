import { useEffect, useRef, useState } from 'react';
import { formatClock, formatDate } from '#lib/format/times';
import { localDateAt } from '#lib/time/zone';
import { Descriptor } from '../../ui/Descriptor';
import { dayOf, QUARTER_SEC, quarterBefore, sameClockOn } from '../model/day';

interface TimeControlProps {
  zone: string;
  nowSec: number;
  /** Beginning of the quarter-hour shown, epoch seconds; null: now. */
  atSec: number | null;
  onShow: (atSec: number | null) => void;
}

/** A quarter-hour of a day passes in that time while it plays. */
const STEP_MS = 700;

/** Which moment the map shows: now, or a quarter-hour of a day, which can be scrubbed and played. */
export function TimeControl({ zone, nowSec, atSec, onShow }: TimeControlProps) {
  const day = dayOf(atSec ?? nowSec, zone, nowSec);
  const count = Math.max(1, (day.toSec - day.fromSec) / QUARTER_SEC);
  // On the day that goes on the last place is now.
  const last = day.isToday ? count : count - 1;
  const place = atSec === null ? last : Math.min(last, (atSec - day.fromSec) / QUARTER_SEC);
  const showPlace = (next: number) =>
    onShow(day.isToday && next >= count ? null : day.fromSec + next * QUARTER_SEC);
  const step = (by: number) => showPlace(Math.min(last, Math.max(0, place + by)));
  const [isPlaying, setIsPlaying] = usePlaying(place, last, () => step(1));
  const words = atSec === null ? 'now' : quarterWords(atSec, zone);
  const play = () => {
    if (place >= last) showPlace(0);
    setIsPlaying(!isPlaying);
  };
  return (
    <div
      role="group"
      aria-label="Moment shown"
      data-screen-only
      className="mt-2 flex flex-wrap items-center gap-x-3 gap-y-2 text-table"
    >
      <button
        type="button"
        className="button button-small"
        aria-pressed={atSec === null}
        onClick={() => onShow(null)}
      >
        Live
      </button>
      <label>
        <span className="sr-only">Day</span>
        <input
          type="date"
          className="field-control w-auto"
          value={day.date}
          max={localDateAt(nowSec, zone)}
          onChange={({ target }) =>
            onShow(sameClockOn(target.value, atSec ?? quarterBefore(nowSec), zone, nowSec))
          }
        />
      </label>
      <span className="flex items-center gap-1">
        <button type="button" className="button button-small" onClick={() => step(-1)} disabled={place <= 0}>
          <span aria-hidden="true">‹</span>
          <span className="sr-only">Quarter-hour before</span>
        </button>
        <button
          type="button"
          className="button button-small"
          onClick={() => step(1)}
          disabled={place >= last}
        >
          <span aria-hidden="true">›</span>
          <span className="sr-only">Quarter-hour after</span>
        </button>
        <button type="button" className="button button-small motion-reduce:hidden" onClick={play}>
          {isPlaying ? 'Pause' : 'Play'}
        </button>
      </span>
      <input
        type="range"
        className="min-w-40 grow accent-reed"
        aria-label="Quarter-hour of the day"
        min={0}
        max={last}
        step={1}
        value={place}
        aria-valuetext={words}
        onChange={({ target }) => {
          setIsPlaying(false);
          showPlace(Number(target.value));
        }}
      />
      <span className="w-full tabular-nums" aria-live={isPlaying ? 'off' : 'polite'}>
        {atSec === null ? (
          'Levels as they arrive'
        ) : (
          <>
            <Descriptor name="LAeq" window="15 min" />, {formatDate(atSec, zone)}, {words}
          </>
        )}
      </span>
    </div>
  );
}

function quarterWords(fromSec: number, zone: string): string {
  return `${formatClock(fromSec, zone)} to ${formatClock(fromSec + QUARTER_SEC, zone)}`;
}

/** Whether it plays; calls `advance` at a pace that can be read, until the last place is shown. */
function usePlaying(place: number, last: number, advance: () => void) {
  const [isWanted, setIsWanted] = useState(false);
  const isPlaying = isWanted && place < last;
  // The pace goes by what is shown: the page is drawn anew more often than that while levels arrive.
  const next = useRef(advance);
  useEffect(() => {
    next.current = advance;
  });
  useEffect(() => {
    if (!isPlaying) return undefined;
    const timer = setTimeout(() => next.current(), STEP_MS);
    return () => clearTimeout(timer);
  }, [isPlaying, place]);
  return [isPlaying, setIsWanted] as const;
}
