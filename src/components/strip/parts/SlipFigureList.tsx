import { type ReactNode } from 'react';
import { formatLevelDb } from '#lib/format/levels';
import { bandRangeWords } from '../model/bandWords';
import { type BandSelection } from '../model/selection';
import { type SlipFigures } from '../model/slipFigures';

interface SlipFigureListProps {
  /** Null while nothing is known. */
  figures: SlipFigures | null;
  bandsLeqDb: number | null;
  bands: BandSelection | null;
}

/** The figures as a list; rows keep their place while figures are on their way. */
export function SlipFigureList({ figures, bandsLeqDb, bands }: SlipFigureListProps) {
  const sample = figures?.sampleSec ? ` of LAeq,${figures.sampleSec} s` : '';
  return (
    <dl className="tabular-nums">
      <Row
        term={
          <>
            L<sub>Aeq</sub>
          </>
        }
        value={formatLevelDb(figures?.laeqDb)}
      />
      <Row
        term={
          <>
            L<sub>AFmax</sub>
          </>
        }
        value={formatLevelDb(figures?.lafmaxDb)}
      />
      <Row
        term={
          <span title={`Levels exceeded 10 % and 90 % of the time${sample}`}>
            L<sub>A10</sub> / L<sub>A90</sub>
          </span>
        }
        value={`${formatLevelDb(figures?.la10Db)} / ${formatLevelDb(figures?.la90Db)}`}
      />
      {bands && (
        <Row
          term={
            <>
              L<sub>eq</sub> {bandRangeWords(bands)}
            </>
          }
          value={formatLevelDb(bandsLeqDb)}
          unit="dB (Z)"
        />
      )}
    </dl>
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
