import { type ReactNode } from 'react';
import type { UsualLevels } from '#lib/contracts/usual';
import { formatDifferenceDb, formatLevelDb } from '#lib/format/levels';
import { Descriptor } from '../../ui/Descriptor';
import { bandRangeWords } from '../model/bandWords';
import { type BandSelection } from '../model/selection';
import { type SlipFigures } from '../model/slipFigures';

interface SlipFigureListProps {
  /** Null while nothing is known. */
  figures: SlipFigures | null;
  bandsLeqDb: number | null;
  bands: BandSelection | null;
  /** Null where it is not known, or not asked. */
  usual: UsualLevels | null;
}

/** The figures as a list; rows keep their place while figures are on their way. */
export function SlipFigureList({ figures, bandsLeqDb, bands, usual }: SlipFigureListProps) {
  return (
    <>
      <dl className="tabular-nums">
        <Row term={<Descriptor name="LAeq" />} value={formatLevelDb(figures?.laeqDb)} />
        <Row term={<Descriptor name="LAFmax" />} value={formatLevelDb(figures?.lafmaxDb)} />
        <Row
          term={
            <>
              <Descriptor name="LA10" /> / <Descriptor name="LA90" />
              {figures?.sampleSec && <SampleWords sampleSec={figures.sampleSec} />}
            </>
          }
          value={`${formatLevelDb(figures?.la10Db)} / ${formatLevelDb(figures?.la90Db)}`}
        />
        {bands && (
          <Row
            term={
              <>
                <Descriptor name="Leq" /> {bandRangeWords(bands)}
              </>
            }
            value={formatLevelDb(bandsLeqDb)}
            unit="dB (Z)"
          />
        )}
      </dl>
      {usual && <UsualWords usual={usual} laeqDb={figures?.laeqDb ?? null} />}
    </>
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

function Row({ term, value, unit = 'dB' }: { term: ReactNode; value: string; unit?: string }) {
  return (
    <div className="flex items-baseline border-b border-line py-1">
      <dt className="grow">{term}</dt>
      <dd>{value}</dd>
      <dd className="w-13 pl-1.5 text-ink-soft">{unit}</dd>
    </div>
  );
}
