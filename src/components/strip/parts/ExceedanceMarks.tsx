import { memo } from 'react';
import { formatInstantUtc } from '#lib/contracts/instants';
import { limitValueText } from '#lib/format/limitMetric';
import { type StripGeometry } from '../draw/geometry';
import { exceedanceMarks, type StripExceedance } from '../model/exceedanceMarks';
import { type GroupedMark } from '../model/groupMarks';
import { stretchWords } from '../model/timeWords';
import { pxAtSec, type TimeView } from '../model/timeView';

interface ExceedanceMarksProps {
  exceedances: readonly StripExceedance[];
  view: TimeView;
  geometry: StripGeometry;
  zone: string;
  /** Address of the network's exceedances. */
  listUrl: string;
}

/** What a finger needs (WCAG 2.2, 2.5.8). */
const TARGET_PX = 24;

/** A triangle at each exceedance that leads to it; several close together share one that leads to the list. */
export const ExceedanceMarks = memo(function ExceedanceMarks({
  exceedances,
  view,
  geometry,
  zone,
  listUrl,
}: ExceedanceMarksProps) {
  const { x, y, width, height } = geometry.marks;
  const marks = exceedanceMarks(exceedances, (sec) => pxAtSec(view, width, sec), width, TARGET_PX + 1);
  return marks.map((mark) => (
    <a
      key={mark.held[0]?.id}
      href={addressOf(mark, listUrl)}
      title={wordsOf(mark, zone)}
      aria-label={wordsOf(mark, zone)}
      className="absolute flex items-center justify-center text-rust"
      style={{
        left: x + mark.px - TARGET_PX / 2,
        top: y + (height - TARGET_PX) / 2,
        width: TARGET_PX,
        height: TARGET_PX,
      }}
    >
      {mark.held.length === 1 ? (
        <svg viewBox="0 0 12 10" width="11" height="9" aria-hidden="true">
          <path d="M0 0h12L6 10z" fill="currentColor" />
        </svg>
      ) : (
        <svg viewBox="0 0 18 16" width="18" height="16" aria-hidden="true">
          <path d="M0 0h18L9 16z" fill="currentColor" />
          <text x="9" y="8.5" textAnchor="middle" fontSize="9" fontWeight="700" className="fill-paper">
            {mark.held.length > 9 ? '9+' : mark.held.length}
          </text>
        </svg>
      )}
    </a>
  ));
});

function addressOf({ held }: GroupedMark<StripExceedance>, listUrl: string): string {
  const [first] = held;
  if (held.length === 1 && first) return `${listUrl}/${first.id}`;
  const from = Math.min(...held.map(({ fromSec }) => fromSec));
  const to = Math.max(...held.map(({ toSec }) => toSec));
  const query = new URLSearchParams({ from: formatInstantUtc(from), to: formatInstantUtc(to) });
  return `${listUrl}?${query.toString()}`;
}

function wordsOf({ held }: GroupedMark<StripExceedance>, zone: string): string {
  const [first] = held;
  if (!first) return '';
  if (held.length > 1) return `${held.length} exceedances from ${stretchWords(first, zone)}`;
  const { limitName, levelDb, thresholdDb, unit } = first;
  return `Exceedance, ${stretchWords(first, zone)}: ${limitValueText(levelDb, unit)}, ${limitName}, limit ${limitValueText(thresholdDb, unit)}`;
}
