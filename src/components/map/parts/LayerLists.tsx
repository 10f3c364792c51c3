import { type LayerData } from '../hooks/useLayerData';
import { complaintsWords, windWords } from '../model/layerMarks';
import { WindArrow } from './LayerMarks';

interface LayerListsProps {
  slug: string;
  data: LayerData;
}

/** In words what complaints and wind are on the map. */
export function LayerLists({ slug, data: { complaints, winds, error } }: LayerListsProps) {
  return (
    <>
      {error && <p className="border-l-3 border-ochre pl-3 text-table">{error.message}</p>}
      {complaints && <Complaints slug={slug} complaints={complaints} />}
      {winds && (
        <section className="text-table">
          <h2 className="text-body">Wind</h2>
          {winds.length === 0 && <p className="text-ink-soft">No mast or sensor tells it for this moment.</p>}
          <ul>
            {winds.map((wind) => (
              <li key={`${wind.source} ${wind.code}`} className="flex gap-2 py-0.5">
                <span className="mt-0.5">
                  <WindArrow fromDeg={wind.direction} />
                </span>
                <span>
                  {wind.name}{' '}
                  <span className="text-ink-soft">
                    {wind.source === 'mast' ? 'mast' : wind.code}, {windWords(wind)}
                  </span>
                </span>
              </li>
            ))}
          </ul>
        </section>
      )}
    </>
  );
}

function Complaints({
  slug,
  complaints,
}: {
  slug: string;
  complaints: NonNullable<LayerData['complaints']>;
}) {
  const { places, withoutPlace, isComplete } = complaints;
  return (
    <section className="text-table">
      <h2 className="text-body">Complaints in the period</h2>
      {places.length + withoutPlace.length === 0 && <p className="text-ink-soft">None.</p>}
      <ul>
        {places.map(({ latitude, longitude, references }) => (
          <li key={`${latitude} ${longitude}`} className="py-0.5">
            <References slug={slug} references={references} />{' '}
            <span className="text-ink-soft">
              {complaintsWords(references.length)}: {latitude.toFixed(2)}, {longitude.toFixed(2)}
            </span>
          </li>
        ))}
        {withoutPlace.length > 0 && (
          <li className="py-0.5">
            <References slug={slug} references={withoutPlace} />{' '}
            <span className="text-ink-soft">without a place</span>
          </li>
        )}
      </ul>
      {!isComplete && (
        <p className="text-ochre-text">The period has more; choose a shorter one to see all.</p>
      )}
    </section>
  );
}

function References({ slug, references }: { slug: string; references: readonly string[] }) {
  return references.map((reference, at) => (
    <span key={reference}>
      {at > 0 && ', '}
      <a href={`/n/${slug}/complaints/${encodeURIComponent(reference)}`}>{reference}</a>
    </span>
  ));
}
