import { type ReactNode } from 'react';
import type { UsualLevels } from '#lib/contracts/usual';
import { formatDifferenceDb, formatLevelDb, NO_FIGURE } from '#lib/format/levels';
import { Descriptor } from '../../ui/Descriptor';
import { percentWords } from '../../figures/figureWords';
import { bandRangeWords } from '../model/bandWords';
import { differenceDb } from '../model/reading';
import { type BandSelection } from '../model/selection';
import { type MarkedBands, type SlipFigures } from '../model/slipFigures';

interface SlipFigureListProps {
  /** Null while nothing is known. */
  figures: SlipFigures | null;
  /** Null where no bands are marked, or nothing is known. */
  marked: MarkedBands | null;
  bands: BandSelection | null;
  /** Null where it is not known, or not asked. */
  usual: UsualLevels | null;
  /** Figures that these are compared with, if any, and theirs over the marked bands. */
  reference: SlipFigures | null;
  referenceBandsDb: number | null;
}

/** The figures as a list; rows keep their place while figures are on their way. */
export function SlipFigureList({ figures, marked, bands, usual, ...props }: SlipFigureListProps) {
  const { reference, referenceBandsDb } = props;
  const against = (levelDb: number | null | undefined, fromDb: number | null | undefined) =>
    reference && <Difference ofDb={differenceDb(levelDb ?? null, fromDb ?? null)} />;
  return (
    <>
      {reference && <p className="text-right text-small text-ink-soft">against the strip above</p>}
      <dl className="tabular-nums">
        <Row
          term={<Descriptor name="LAeq" />}
          value={formatLevelDb(figures?.laeqDb)}
          difference={against(figures?.laeqDb, reference?.laeqDb)}
        />
        <Row
          term={<Descriptor name="LAFmax" />}
          value={formatLevelDb(figures?.lafmaxDb)}
          difference={against(figures?.lafmaxDb, reference?.lafmaxDb)}
        />
        <Row
          term={
            <>
              <Descriptor name="LA10" /> / <Descriptor name="LA90" />
              {figures?.sampleSec && <SampleWords sampleSec={figures.sampleSec} />}
            </>
          }
          value={`${formatLevelDb(figures?.la10Db)} / ${formatLevelDb(figures?.la90Db)}`}
          isTall
        />
        {bands && (
          <Row
            term={
              <>
                <Descriptor name="Leq" /> {bandRangeWords(bands)}
              </>
            }
            value={formatLevelDb(marked?.leqDb)}
            unit="dB (Z)"
            difference={against(marked?.leqDb, referenceBandsDb)}
          />
        )}
        {bands && (
          <Row
            term="of all energy, Z / A"
            value={`${shareWords(marked?.shareZ)} / ${shareWords(marked?.shareA)}`}
            unit=""
          />
        )}
      </dl>
      {usual && <UsualWords usual={usual} laeqDb={figures?.laeqDb ?? null} />}
    </>
  );
}

function shareWords(share: number | null | undefined): string {
  return share === null || share === undefined ? NO_FIGURE : percentWords(share);
}

function Difference({ ofDb }: { ofDb: number | null }) {
  return (
    <dd className="w-14 text-right font-medium">{ofDb === null ? NO_FIGURE : formatDifferenceDb(ofDb)}</dd>
  );
}

function SampleWords({ sampleSec }: { sampleSec: number }) {
  return (
    <span className="text-ink-soft text-small">
      {' '}
      of <Descriptor name="LAeq" window={`${sampleSec} s`} />
    </span>
  );
}

/** How the level compares with the same weekday and clock window in the weeks before. */
function UsualWords({ usual, laeqDb }: { usual: UsualLevels; laeqDb: number | null }) {
  const { median, low, high } = usual.LAeq;
  const counted = `${usual.validWeeks} of the ${usual.weeks} weeks before`;
  if (median === null) {
    return (
      <p className="text-ink-soft text-small mt-2">
        What is usual here is not known: none of the {usual.weeks} weeks before has enough data.
      </p>
    );
  }
  return (
    <p className="text-small mt-2">
      {laeqDb !== null && (
        <>
          <b className="font-medium tabular-nums">{formatDifferenceDb(laeqDb - median)} dB</b> against the
          usual{' '}
        </>
      )}
      {laeqDb === null && 'Usual: '}
      <span className="tabular-nums">{formatLevelDb(median)} dB</span>
      <span className="text-ink-soft">
        {' '}
        (median of {counted}, this weekday and time; most between {formatLevelDb(low)} and{' '}
        {formatLevelDb(high)} dB)
      </span>
    </p>
  );
}

interface RowProps {
  term: ReactNode;
  value: string;
  unit?: string;
  difference?: ReactNode;
  /** Keeps the place of a second line of the term. */
  isTall?: boolean;
}

function Row({ term, value, unit = 'dB', difference = null, isTall = false }: RowProps) {
  return (
    <div className={`flex items-baseline border-b border-line py-1 ${isTall ? 'min-h-[3.4em]' : ''}`}>
      <dt className="grow">{term}</dt>
      <dd>{value}</dd>
      <dd className={unit ? 'w-13 pl-1.5 text-ink-soft' : 'w-0'}>{unit}</dd>
      {difference}
    </div>
  );
}
