import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import { ServerRefusal } from './hooks/fetchJson';
import { StripView, type StripProps } from './StripView';

const MOST_RETRIES = 3;

/** The strip as an island of its own: everything that a station measured over time, on one axis, to be read and marked. */
export function Strip(props: StripProps) {
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: {
          queries: {
            // What the server refuses it will refuse again; a lost connection comes back.
            retry: (count, error) => count < MOST_RETRIES && !isRefusal(error),
            refetchOnWindowFocus: true,
          },
        },
      }),
  );
  return (
    <QueryClientProvider client={client}>
      <StripView {...props} />
    </QueryClientProvider>
  );
}

function isRefusal(error: unknown): boolean {
  return error instanceof ServerRefusal && error.status >= 400 && error.status < 500;
}
