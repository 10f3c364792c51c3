import { type Columns } from '../hooks/useColumns';

/** Says that something is on its way, or that it could not be fetched and what can be done. */
export function LoadingState({ columns }: { columns: Columns }) {
  return (
    <div className="relative">
      <p aria-live="polite" className="absolute right-0 bottom-0 text-small text-ink-soft">
        {columns.isLoading && 'fetching …'}
      </p>
      {columns.error && (
        <p role="alert" className="my-2 border-l-[3px] border-rust pl-3 text-table">
          {columns.error.message}{' '}
          <button type="button" className="button button-small" onClick={columns.retry}>
            Try again
          </button>
        </p>
      )}
    </div>
  );
}
