import { memo, useId } from 'react';
import { type BandFraction } from '#lib/acoustics/bands';
import { type SlipState } from '../hooks/useSlipFigures';
import { type Selection } from '../model/selection';
import { markedBands, type SlipFigures } from '../model/slipFigures';
import { stretchWords } from '../model/timeWords';
import { formatDuration } from '#lib/format/durations';
import { formatCoverage } from '#lib/format/levels';
import { bandRangeWords } from '../model/bandWords';
import { SlipActions, type SlipContext } from './SlipActions';
import { SlipFigureList } from './SlipFigureList';
import { SlipSpectrum } from './SlipSpectrum';

interface ReadingSlipProps {
  selection: Selection;
  /** Whether it was marked by the person; else it is what the strip shows. */
  isMarked: boolean;
  state: SlipState;
  fraction: BandFraction;
  context: SlipContext;
  /** Whose figures they are, where there are several. */
  title: string | null;
  /** Figures that these are compared with, if any. */
  reference: SlipFigures | null;
  className: string;
  onClear: () => void;
}

/** The figures of exactly what is marked on the strip, its spectrum, what stands out, and what can be done next. */
export const ReadingSlip = memo(function ReadingSlip({
  selection,
  isMarked,
  state,
  fraction,
  context,
  title,
  reference,
  className,
  onClear,
}: ReadingSlipProps) {
  const headingId = useId();
  const { figures, usual, error } = state;
  const { bands } = selection;
  return (
    <aside aria-labelledby={headingId} className={`slip self-start text-table ${className}`}>
      <div className="flex items-start justify-between gap-2">
        <h2 id={headingId} className="text-body leading-snug">
          {title && <span className="block">{title}</span>}
          <StretchHeading selection={selection} zone={context.zone} />
        </h2>
        {isMarked && (
          <button
            type="button"
            onClick={onClear}
            aria-label="Clear the selection"
            title="Clear the selection (Escape)"
            className="-mt-1 -mr-2 grid size-8 shrink-0 place-items-center rounded text-lg text-ink-soft hover:bg-ink/5"
          >
            ×
          </button>
        )}
      </div>
      <p className="mb-2 min-h-[1.4em] text-ink-soft">
        {formatDuration(selection.toSec - selection.fromSec)}
        {figures && <CoverageWords figures={figures} />}
      </p>
      {error && <p className="border-l-[3px] border-rust pl-3">{error.message}</p>}
      <SlipFigureList
        figures={figures}
        marked={figures && bands && markedBands(figures, selection)}
        bands={bands}
        reference={reference}
        referenceBandsDb={reference && bands && markedBands(reference, { ...selection, bands }).leqDb}
        usual={usual}
      />
      {/* The spectrum's place is kept while it is on its way. */}
      <div className="min-h-52">
        {figures && (
          <SlipSpectrum figures={figures} selection={selection} fraction={fraction} usual={usual} />
        )}
      </div>
      <SlipActions selection={selection} isMarked={isMarked} context={context} />
    </aside>
  );
});

/** The stretch, broken between its ends and before the bands only. */
function StretchHeading({ selection, zone }: { selection: Selection; zone: string }) {
  const [from, ...rest] = stretchWords(selection, zone).split(' – ');
  return (
    <>
      <span className="inline-block">
        {from}
        {rest.length > 0 && ' –'}
      </span>{' '}
      {rest.length > 0 && <span className="inline-block">{rest[0]}</span>}
      {selection.bands && <span className="block">{bandRangeWords(selection.bands)}</span>}
    </>
  );
}

function CoverageWords({ figures }: { figures: SlipFigures }) {
  if (figures.expectedSec === 0) return ', still to come';
  return (
    <>
      , {formatCoverage(figures.validSec / figures.expectedSec)} covered
      {figures.meetsMinimum === false && <span className="text-ochre-text"> — not enough data</span>}
      {figures.isEstimate && ' · from the screen'}
    </>
  );
}
