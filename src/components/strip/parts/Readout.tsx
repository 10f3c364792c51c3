import { bandLabel, type Band } from '#lib/acoustics/bands';
import { type InvalidityReason } from '#lib/acoustics/validity';
import { type Weighting } from '#lib/acoustics/weighting';
import { formatLevelDb } from '#lib/format/levels';
import { type Reading } from '../model/reading';
import { stretchWords } from '../model/timeWords';

const REASON_WORDS: Record<InvalidityReason, string> = {
  calibration: 'calibration',
  selfcheck: 'self-check',
  overload: 'overload',
  tamper: 'tampering',
  powerloss: 'power loss',
  clockset: 'clock set',
  wind: 'wind',
  'wind-speed': 'wind speed',
  rain: 'rain',
  exclusion: 'excluded by the operator',
};

interface ReadoutProps {
  reading: Reading | null;
  weighting: Weighting;
  zone: string;
  /** Whether it is read out: when the cursor moves by keyboard. */
  isAnnounced: boolean;
}

/** What the strip holds under the cursor, in one line that keeps its place. */
export function Readout({ reading, weighting, zone, isAnnounced }: ReadoutProps) {
  return (
    <p
      className="mb-1.5 min-h-[2.9em] text-small text-ink-soft tabular-nums pad:min-h-[1.45em]"
      aria-live={isAnnounced ? 'polite' : 'off'}
    >
      {reading ? (
        <ReadingWords reading={reading} weighting={weighting} zone={zone} />
      ) : (
        'Drag across the strip to read a stretch of it, or a rectangle of time and bands.'
      )}
    </p>
  );
}

function ReadingWords({
  reading,
  weighting,
  zone,
}: Omit<ReadoutProps, 'isAnnounced' | 'reading'> & { reading: Reading }) {
  const { band } = reading;
  return (
    <>
      <span className="text-ink">{stretchWords(reading, zone)}</span>
      {reading.laeqDb === null ? (
        ' · no data'
      ) : (
        <>
          {' · '}L<sub>Aeq</sub> <b className="font-medium text-ink">{formatLevelDb(reading.laeqDb)}</b> dB
          {reading.lafmaxDb !== null && (
            <>
              {' · '}L<sub>AFmax</sub> {formatLevelDb(reading.lafmaxDb)} dB
            </>
          )}
        </>
      )}
      {band && (
        <>
          {' · '}
          {bandLabel(band)} band ({edgesWords(band)}){' '}
          {reading.bandLevelDb === null ? (
            'no level'
          ) : (
            <>
              <b className="font-medium text-ink">{formatLevelDb(reading.bandLevelDb)}</b> dB ({weighting})
            </>
          )}
        </>
      )}
      {reading.reasons.length > 0 && (
        <span className="text-ochre-text">
          {' · '}left out: {reading.reasons.map((reason) => REASON_WORDS[reason]).join(', ')}
        </span>
      )}
    </>
  );
}

function edgesWords({ lowerHz, upperHz }: Band): string {
  const digits = (hz: number) => String(Number(hz.toPrecision(3)));
  if (upperHz < 1000) return `${digits(lowerHz)}–${digits(upperHz)} Hz`;
  if (lowerHz < 1000) return `${digits(lowerHz)} Hz–${digits(upperHz / 1000)} kHz`;
  return `${digits(lowerHz / 1000)}–${digits(upperHz / 1000)} kHz`;
}
