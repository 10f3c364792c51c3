import type { Station } from '#lib/contracts/stations';
import { useTroubles } from '../hooks/useTroubles';

interface HealthLinesProps {
  slug: string;
  station: Station;
}

/** How a station is at the moment: its battery and what is wrong with it, with the way to its page of health. */
export function HealthLines({ slug, station: { code, latest } }: HealthLinesProps) {
  const { data, error } = useTroubles(slug, code);
  const battery = latest?.battery ?? null;
  return (
    <div className="mt-3">
      <h3 className="text-small text-ink-soft">Health now</h3>
      <ul>
        {error && <li className="text-ochre-text">{error.message}</li>}
        {data?.length === 0 && <li>Nothing is wrong.</li>}
        {data?.map(({ id, what }) => (
          <li key={id} className="text-ochre-text">
            {what}
          </li>
        ))}
        {battery !== null && <li className="tabular-nums">Battery {battery.toFixed(1)} V</li>}
      </ul>
      <a href={`/n/${slug}/health/${encodeURIComponent(code)}`}>Its health</a>
    </div>
  );
}
