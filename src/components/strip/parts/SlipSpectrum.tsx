import { bandLabel, type BandFraction } from '#lib/acoustics/bands';
import { assessTonality } from '#lib/acoustics/tonality';
import { formatLevelDb } from '#lib/format/levels';
import { notAssessableWords, toneWords } from '#lib/format/tones';
import { SpectrumBars } from '../../spectrum/SpectrumBars';
import { selectedBands, type Selection } from '../model/selection';
import { type SlipFigures } from '../model/slipFigures';

interface SlipSpectrumProps {
  figures: SlipFigures;
  selection: Selection;
  fraction: BandFraction;
}

/** The mean spectrum of the selection with its standing-out bands, and what can be said about them. */
export function SlipSpectrum({ figures, selection, fraction }: SlipSpectrumProps) {
  const bands = figures.bands.map(({ band }) => band);
  const levelsDb = figures.bands.map(({ leqDb }) => leqDb);
  if (levelsDb.every((level) => level === null)) return null;
  const assessment = assessTonality(fraction, levelsDb, bands, figures.validSec);
  const findings = assessment.kind === 'assessed' ? assessment.findings : [];
  const isStandingOut = (index: number) =>
    findings.some(({ lowerIndex, upperIndex }) => lowerIndex <= index && index <= upperIndex);
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
      {assessment.kind === 'not-assessable' && (
        <p className="mt-2 text-small text-ink-soft">{notAssessableWords(assessment.reason)}</p>
      )}
      {assessment.kind === 'assessed' && findings.length === 0 && (
        <p className="mt-2 text-small text-ink-soft">No band of the mean spectrum stands out as a tone.</p>
      )}
      {findings.map((finding) => {
        const { band, rest } = toneWords(finding);
        return (
          <p key={`${finding.method}${finding.lowerIndex}`} className="mt-3 border-l-[3px] border-ochre pl-3">
            <b>{band}</b> {rest}.
          </p>
        );
      })}
    </div>
  );
}

function loudestWords({ bands }: SlipFigures): string {
  const held = bands.filter(({ leqDb }) => leqDb !== null);
  const loudest = held.reduce((a, b) => ((b.leqDb ?? 0) > (a.leqDb ?? 0) ? b : a));
  return `loudest band ${bandLabel(loudest.band)} with ${formatLevelDb(loudest.leqDb)} dB`;
}
