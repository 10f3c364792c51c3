import { levelWords, type LevelShown } from './levelWords';

interface Props extends LevelShown {
  /** "dB" unless a band or a weighting calls for more: "dB (Z)". */
  unit?: string;
  /** `headline` under a label; `inline` within a line or a table's cell. */
  size?: 'headline' | 'inline';
}

/** A level with its unit and coverage. The twin of Level.astro. */
export function Level({ unit = 'dB', size = 'inline', ...shown }: Props) {
  const { main, isFigure, note } = levelWords(shown);
  const isHeadline = size === 'headline';
  const scale = isHeadline ? (isFigure ? 'text-figure' : 'text-lead leading-[1.875rem]') : '';
  return (
    <span className={`tabular-nums ${isHeadline ? 'block' : 'whitespace-nowrap'}`}>
      <span className={isHeadline ? 'block' : ''}>
        <span className={`${scale} ${isFigure ? '' : 'text-ochre-text'}`}>{main}</span>
        {isFigure && (
          <span className={`text-ink-soft ${isHeadline ? 'text-small ml-1.5' : 'ml-1'}`}>{unit}</span>
        )}
      </span>
      {note && <span className={`text-ink-soft text-small ${isHeadline ? 'block' : 'ml-2'}`}>{note}</span>}
    </span>
  );
}
