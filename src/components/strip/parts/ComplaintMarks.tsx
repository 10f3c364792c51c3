import { memo } from 'react';
import { type StripGeometry } from '../draw/geometry';
import { complaintMarkWords, type StripComplaint } from '../model/complaintMarks';
import { groupMarks } from '../model/groupMarks';
import { pxAtSec, type TimeView } from '../model/timeView';

interface ComplaintMarksProps {
  complaints: readonly StripComplaint[];
  view: TimeView;
  geometry: StripGeometry;
  zone: string;
  /** Address of the network's complaints. */
  listUrl: string;
}

/** What a finger needs (WCAG 2.2, 2.5.8). */
const TARGET_PX = 24;

/** A speech bubble at each complaint that leads to it; several close together share one that leads to the list. */
export const ComplaintMarks = memo(function ComplaintMarks(props: ComplaintMarksProps) {
  const { complaints, view, geometry, zone, listUrl } = props;
  const { x, y, width, height } = geometry.complaints;
  const marks = groupMarks(complaints, (sec) => pxAtSec(view, width, sec), width, TARGET_PX + 1);
  return marks.map(({ px, held }) => (
    <a
      key={held[0]?.reference}
      href={
        held.length === 1
          ? `${listUrl}/${encodeURIComponent(held[0]?.reference ?? '')}`
          : `${listUrl}?status=all`
      }
      title={complaintMarkWords(held, zone)}
      aria-label={complaintMarkWords(held, zone)}
      className="absolute grid place-items-center text-[12px] font-medium text-paper no-underline"
      style={{
        left: x + px - TARGET_PX / 2,
        top: y + (height - TARGET_PX) / 2,
        width: TARGET_PX,
        height: TARGET_PX,
      }}
    >
      <svg viewBox="0 0 22 20" className="absolute h-5 w-[22px] fill-estuary stroke-paper" aria-hidden="true">
        <path d="M3 1h16q2 0 2 2v10q0 2-2 2h-6l-4 4v-4H3q-2 0-2-2V3q0-2 2-2z" />
      </svg>
      {held.length > 1 && (
        <span className="relative -mt-1 leading-none">{held.length > 9 ? '9+' : held.length}</span>
      )}
    </a>
  ));
});
