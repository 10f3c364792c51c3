import { bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { standingOut } from '#lib/acoustics/standingOut';
import { formatDifferenceDb, formatLevelDb } from '#lib/format/levels';
import { isTone, standingOutWords } from '#lib/format/standingOut';
import type { UsualLevels } from '#lib/contracts/usual';
import { notAssessableWords, toneWords } from '#lib/format/tones';
import { SpectrumBars } from '../../spectrum/SpectrumBars';
import { Descriptor } from '../../ui/Descriptor';
import { FoldedTable } from '../../ui/FoldedTable';
import { selectedBands, type Selection } from '../model/selection';
import { type SlipFigures } from '../model/slipFigures';

interface SlipSpectrumProps {
  figures: SlipFigures;
  selection: Selection;
  fraction: BandFraction;
  /** Null where it is not known, or not asked. */
  usual: UsualLevels | null;
}

/** Ranges that are told in words beside the tones. */
const MOST_RANGES = 2;

/** The mean spectrum of the selection with the bands that stand out of it, and what can be said about them. */
export function SlipSpectrum({ figures, selection, fraction, usual }: SlipSpectrumProps) {
  const bands = figures.bands.map(({ band }) => band);
  const levelsDb = figures.bands.map(({ leqDb }) => leqDb);
  if (levelsDb.every((level) => level === null)) return null;
  const { tonality, ranges } = standingOut({ fraction, levelsDb, bands, averagedSec: figures.validSec });
  const tones = tonality.kind === 'assessed' ? tonality.findings : [];
  const others = ranges.filter((range) => !isTone(range)).slice(0, MOST_RANGES);
  const held = [...ranges.filter(isTone), ...others];
  const isStandingOut = (index: number) =>
    held.some(({ lowerIndex, upperIndex }) => lowerIndex <= index && index <= upperIndex);
  const marked = new Set(selection.bands ? selectedBands(selection, bands).map(({ index }) => index) : []);
  const usualBands = (fraction === 1 ? usual?.octaves : usual?.bands) ?? [];
  const usualOf = new Map(usualBands.map(({ nominalHz, median }) => [nominalHz, median]));
  return (
    <div className="mt-4">
      <SpectrumBars
        summary={`Mean spectrum, unweighted: ${loudestWords(figures)}${againstUsualWords(figures, usualOf)}.`}
        bars={figures.bands.map((figure) => ({
          ...figure,
          usualDb: usualOf.get(figure.band.nominalHz) ?? null,
          isStandingOut: isStandingOut(figure.band.index),
          isMarked: marked.has(figure.band.index),
        }))}
      />
      <p className="mt-1 text-small text-ink-soft">
        Mean of each band, dB (Z){!figures.isEstimate && '; line: L10'}
        {usualOf.size > 0 && (
          <>
            ; <span className="text-estuary">blue dash</span>: usual, median of {usual?.validWeeks} weeks
          </>
        )}
      </p>
      <FoldedTable
        label="The spectrum as a table"
        columns={[
          'Band',
          <ColumnName key="Leq" name="Leq" />,
          ...(figures.isEstimate ? [] : [<ColumnName key="L10" name="L10" />]),
          ...(usualOf.size > 0 ? ['usual dB'] : []),
        ]}
        rows={figures.bands.map(({ band, leqDb, l10Db }) => ({
          key: String(band.index),
          heading: bandLabel(band),
          cells: [
            formatLevelDb(leqDb),
            ...(figures.isEstimate ? [] : [formatLevelDb(l10Db)]),
            ...(usualOf.size > 0 ? [formatLevelDb(usualOf.get(band.nominalHz))] : []),
          ],
        }))}
      />
      {tonality.kind === 'not-assessable' && (
        <p className="mt-2 text-small text-ink-soft">{notAssessableWords(tonality.reason)}</p>
      )}
      {tones.map((finding) => {
        const { band, rest } = toneWords(finding);
        return (
          <p key={`${finding.method}${finding.lowerIndex}`} className="mt-3 border-l-3 border-ochre pl-3">
            <b>{band}</b> {rest}.
          </p>
        );
      })}
      {others.map((range) => (
        <p key={range.lowerIndex} className="mt-2 text-small">
          {standingOutWords(range, fraction)}.
        </p>
      ))}
      {tonality.kind === 'assessed' && held.length === 0 && (
        <p className="mt-2 text-small text-ink-soft">No band of the mean spectrum stands out.</p>
      )}
    </div>
  );
}

function ColumnName({ name }: { name: string }) {
  return (
    <>
      <Descriptor name={name} /> dB
    </>
  );
}

/** The band that lies farthest above what is usual, for the summary. */
function againstUsualWords({ bands }: SlipFigures, usualOf: ReadonlyMap<number, number>): string {
  const above = bands.flatMap(({ band, leqDb }) => {
    const usualDb = usualOf.get(band.nominalHz);
    return leqDb === null || usualDb === undefined ? [] : [{ band, byDb: leqDb - usualDb }];
  });
  const most = above.toSorted((a, b) => b.byDb - a.byDb)[0];
  return most
    ? `; against the usual most at ${bandLabel(most.band)}, ${formatDifferenceDb(most.byDb)} dB`
    : '';
}

function loudestWords({ bands }: SlipFigures): string {
  const held = bands.filter(({ leqDb }) => leqDb !== null);
  const loudest = held.reduce((a, b) => ((b.leqDb ?? 0) > (a.leqDb ?? 0) ? b : a));
  return `loudest band ${bandLabel(loudest.band)} with ${formatLevelDb(loudest.leqDb)} dB`;
}
