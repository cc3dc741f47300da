import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { Refusal } from './api.ts';

/** One client for each island. A refusal is an answer and is not asked again; an outage is tried once more. */
export function IslandQueries({ children }: { readonly children: ReactNode }) {
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: {
          queries: {
            retry: (failures, error) =>
              failures < 1 && error instanceof Refusal && error.problem.status === 503,
            staleTime: 15_000,
            refetchOnWindowFocus: true,
          },
        },
      }),
  );
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>;
}
