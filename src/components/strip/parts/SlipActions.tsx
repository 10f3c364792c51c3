import { useState } from 'react';
import { formatInstantUtc } from '#lib/contracts/instants';
import { periodQuery } from '../hooks/useStatistics';
import { formatSelection, type Selection } from '../model/selection';
import { ExcludeForm } from './ExcludeForm';

/** Where the slip's actions lead and who may do them. */
export interface SlipContext {
  slug: string;
  stationCode: string;
  zone: string;
  mayExclude: boolean;
  mayLogComplaints: boolean;
  /** The strip that this one is shown over: closer looks keep it there. */
  beside: { stationCode: string; shiftSec: number } | null;
}

interface SlipActionsProps {
  selection: Selection;
  isMarked: boolean;
  context: SlipContext;
}

/** What can be done with a stretch of time: look closer, log a complaint, leave it out, pass it on, take the numbers. */
export function SlipActions({ selection, isMarked, context }: SlipActionsProps) {
  const [isExcluding, setExcluding] = useState(false);
  const { slug, stationCode } = context;
  const period = periodQuery(selection);
  const code = encodeURIComponent(stationCode);
  const marked = new URLSearchParams({
    from: formatInstantUtc(selection.fromSec),
    to: formatInstantUtc(selection.toSec),
    station: stationCode,
  });
  return (
    <div className="mt-4 flex flex-wrap gap-2">
      {isMarked && (
        <a
          className="button button-primary"
          href={`/n/${slug}/stations/${code}?${period}${besideQuery(selection, context)}#selection=${formatSelection(selection)}`}
        >
          Zoom here
        </a>
      )}
      {context.mayLogComplaints && (
        <a className="button" href={`/n/${slug}/complaints/new?${marked.toString()}`}>
          Log a complaint
        </a>
      )}
      {context.mayExclude && isMarked && (
        <button
          type="button"
          className="button"
          aria-expanded={isExcluding}
          onClick={() => setExcluding(!isExcluding)}
        >
          Exclude
        </button>
      )}
      <a className="button" href={`/n/${slug}/spectra/search?${marked.toString()}`}>
        Find elsewhere
      </a>
      <CopyLink />
      <a className="button" href={`/api/v1/networks/${slug}/stations/${code}/intervals.csv?${period}`}>
        CSV
      </a>
      {isExcluding && isMarked && (
        <ExcludeForm selection={selection} context={context} onDone={() => setExcluding(false)} />
      )}
    </div>
  );
}

function besideQuery({ fromSec }: Selection, { stationCode, beside }: SlipContext): string {
  if (!beside) return '';
  const query = new URLSearchParams();
  if (beside.stationCode !== stationCode) query.set('with', beside.stationCode);
  if (beside.shiftSec !== 0) query.set('against', formatInstantUtc(fromSec + beside.shiftSec));
  return `&${query.toString()}`;
}

function CopyLink() {
  const [state, setState] = useState<'ready' | 'copied' | 'failed'>('ready');
  const copy = () =>
    navigator.clipboard.writeText(location.href).then(
      () => setState('copied'),
      () => setState('failed'),
    );
  return (
    <button type="button" className="button" onClick={() => void copy()}>
      <span aria-live="polite">
        {{ ready: 'Copy link', copied: 'Link copied', failed: 'Copy the address above' }[state]}
      </span>
    </button>
  );
}
