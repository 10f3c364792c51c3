import { bandLabel, type Band } from '#lib/acoustics/bands';
import { type InvalidityReason } from '#lib/acoustics/validity';
import { type Weighting } from '#lib/acoustics/weighting';
import { formatDuration } from '#lib/format/durations';
import { formatDifferenceDb, formatLevelDb } from '#lib/format/levels';
import { differenceDb, type Reading } from '../model/reading';
import { stretchWords } from '../model/timeWords';
import { type Track } from '../model/track';

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
  'mast-wind': 'wind at the mast',
  'mast-rain': 'rain at the mast',
};

interface ReadoutProps {
  /** One of each strip, from the top down. */
  readings: readonly { track: Track; reading: Reading | null }[];
  weighting: Weighting;
  zone: string;
  /** Whether it is read out: when the cursor moves by keyboard. */
  isAnnounced: boolean;
}

/** What the strips hold under the cursor, in a line each that keeps its place; the second one's with its difference from the first. */
export function Readout({ readings, weighting, zone, isAnnounced }: ReadoutProps) {
  const [first] = readings;
  return (
    <div className="mb-1.5 text-small text-ink-soft tabular-nums" aria-live={isAnnounced ? 'polite' : 'off'}>
      {readings.map(({ track, reading }, at) => (
        <p
          key={at}
          className={at === 0 ? 'min-h-[2.9em] pad:min-h-[1.45em]' : 'min-h-[4.4em] pad:min-h-[2.9em]'}
        >
          {reading && readings.length > 1 && <span className="text-ink">{track.station.code} </span>}
          {reading && <ReadingWords reading={reading} weighting={weighting} zone={zone} />}
          {reading && at > 0 && first?.reading && (
            <DifferenceWords
              reading={reading}
              first={first.reading}
              name={first.track.station.code === track.station.code ? 'above' : first.track.station.code}
            />
          )}
          {!reading &&
            at === 0 &&
            'Drag across the strip to read a stretch of it, or a rectangle of time and bands.'}
        </p>
      ))}
    </div>
  );
}

/** How far levels lie above those of the strip above. */
function DifferenceWords({ reading, first, name }: { reading: Reading; first: Reading; name: string }) {
  const laeqDb = differenceDb(reading.laeqDb, first.laeqDb);
  const bandDb = differenceDb(reading.bandLevelDb, first.bandLevelDb);
  if (laeqDb === null && bandDb === null) return null;
  return (
    <>
      {' · against '}
      {name}:{' '}
      {laeqDb !== null && (
        <>
          L<sub>Aeq</sub> <b className="font-medium text-ink">{formatDifferenceDb(laeqDb)}</b> dB
        </>
      )}
      {bandDb !== null && (
        <>
          , band <b className="font-medium text-ink">{formatDifferenceDb(bandDb)}</b> dB
        </>
      )}
    </>
  );
}

function ReadingWords({
  reading,
  weighting,
  zone,
}: Pick<ReadoutProps, 'weighting' | 'zone'> & { reading: Reading }) {
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
          {reading.percentiles && <PercentileWords {...reading.percentiles} />}
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

function PercentileWords({ blockSec, la10Db, la50Db, la90Db }: NonNullable<Reading['percentiles']>) {
  return (
    <>
      {' · '}
      {formatDuration(blockSec)} L<sub>A10</sub> {formatLevelDb(la10Db)}, L<sub>A50</sub>{' '}
      {formatLevelDb(la50Db)}, L<sub>A90</sub> {formatLevelDb(la90Db)} dB
    </>
  );
}

function edgesWords({ lowerHz, upperHz }: Band): string {
  const digits = (hz: number) => String(Number(hz.toPrecision(3)));
  if (upperHz < 1000) return `${digits(lowerHz)}–${digits(upperHz)} Hz`;
  if (lowerHz < 1000) return `${digits(lowerHz)} Hz–${digits(upperHz / 1000)} kHz`;
  return `${digits(lowerHz / 1000)}–${digits(upperHz / 1000)} kHz`;
}
