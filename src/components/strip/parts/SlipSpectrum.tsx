import { bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { standingOut } from '#lib/acoustics/standingOut';
import { formatLevelDb } from '#lib/format/levels';
import { isTone, standingOutWords } from '#lib/format/standingOut';
import { notAssessableWords, toneWords } from '#lib/format/tones';
import { SpectrumBars } from '../../spectrum/SpectrumBars';
import { selectedBands, type Selection } from '../model/selection';
import { type SlipFigures } from '../model/slipFigures';

interface SlipSpectrumProps {
  figures: SlipFigures;
  selection: Selection;
  fraction: BandFraction;
}

/** Ranges that are told in words beside the tones. */
const MOST_RANGES = 2;

/** The mean spectrum of the selection with the bands that stand out of it, and what can be said about them. */
export function SlipSpectrum({ figures, selection, fraction }: SlipSpectrumProps) {
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
  return (
    <div className="mt-4">
      <SpectrumBars
        summary={`Mean spectrum, unweighted: ${loudestWords(figures)}.`}
        bars={figures.bands.map((figure) => ({
          ...figure,
          isStandingOut: isStandingOut(figure.band.index),
          isMarked: marked.has(figure.band.index),
        }))}
      />
      <p className="mt-1 text-small text-ink-soft">
        Mean of each band, dB (Z){!figures.isEstimate && '; line: L10'}
      </p>
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

function loudestWords({ bands }: SlipFigures): string {
  const held = bands.filter(({ leqDb }) => leqDb !== null);
  const loudest = held.reduce((a, b) => ((b.leqDb ?? 0) > (a.leqDb ?? 0) ? b : a));
  return `loudest band ${bandLabel(loudest.band)} with ${formatLevelDb(loudest.leqDb)} dB`;
}
