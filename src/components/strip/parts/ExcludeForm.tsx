import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useId, useState, type FormEvent } from 'react';
import { formatInstantUtc } from '#lib/contracts/instants';
import { postJson } from '../hooks/fetchJson';
import { type Selection } from '../model/selection';
import { stretchWords } from '../model/timeWords';
import { type SlipContext } from './SlipActions';

interface ExcludeFormProps {
  selection: Selection;
  context: SlipContext;
  onDone: () => void;
}

/** Leaves the selected time out of statistics with a reason; the data stay, and it can be withdrawn. */
export function ExcludeForm({ selection, context, onDone }: ExcludeFormProps) {
  const [reason, setReason] = useState('');
  const client = useQueryClient();
  const fieldId = useId();
  const exclusion = useMutation({
    mutationFn: () =>
      postJson(`/api/v1/networks/${context.slug}/exclusions`, {
        station: context.stationCode,
        from: formatInstantUtc(selection.fromSec),
        to: formatInstantUtc(selection.toSec),
        reason: reason.trim(),
      }),
    onSuccess: () => client.invalidateQueries(),
  });

  const submit = (event: FormEvent) => {
    event.preventDefault();
    exclusion.mutate();
  };

  if (exclusion.isSuccess) {
    return (
      <p className="basis-full border-l-[3px] border-reed pl-3" role="status">
        Excluded. The data stay and can be counted again under “Exclusions” on{' '}
        <a href={location.pathname + location.search}>this page</a>.{' '}
        <button type="button" className="button button-plain" onClick={onDone}>
          Close
        </button>
      </p>
    );
  }
  return (
    <form onSubmit={submit} className="basis-full border-t border-line pt-3">
      <label htmlFor={fieldId} className="field-label">
        Why should it not count?
      </label>
      <p className="field-hint mb-1.5">
        {stretchWords(selection, context.zone)}, all bands. The reason is shown wherever figures leave it out.
      </p>
      <input
        id={fieldId}
        required
        maxLength={500}
        value={reason}
        onChange={(event) => setReason(event.target.value)}
        placeholder="Grass cutting at the mast"
        className="field-control"
      />
      {exclusion.error && (
        <p className="field-error" role="alert">
          {exclusion.error.message}
        </p>
      )}
      <button
        type="submit"
        disabled={exclusion.isPending || reason.trim() === ''}
        className="button button-primary mt-2"
      >
        {exclusion.isPending ? 'Excluding …' : 'Exclude it'}
      </button>
    </form>
  );
}
