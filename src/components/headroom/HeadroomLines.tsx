import { assumptionWords, isPressing, verdictWords, windowWords } from './headroomWords';
import { useHeadroom } from './useHeadroom';

interface HeadroomLinesProps {
  slug: string;
  code: string;
  zone: string;
}

/** A station's headroom in a few lines: of each limit whose window is open, what its rest may be. Nothing while there is none. */
export function HeadroomLines({ slug, code, zone }: HeadroomLinesProps) {
  const { data } = useHeadroom(slug, code);
  if (!data || data.items.length === 0) return null;
  return (
    <div className="mt-3">
      <h3 className="text-small text-ink-soft">Headroom now</h3>
      <ul className="space-y-1">
        {data.items.map((item) => (
          <li key={item.limit.id}>
            {item.limit.name}, {windowWords(item, zone)}:{' '}
            <span className={isPressing(item) ? 'font-medium text-rust' : ''}>{verdictWords(item)}</span>
            {assumptionWords(item) && (
              <span className="text-small text-ink-soft block">{assumptionWords(item)}</span>
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}
