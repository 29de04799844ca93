import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { type ReactNode, useState } from 'react';
import { ApiError } from './api';

const MAX_RETRIES = 2;

/** A refusal stays a refusal; only silence and 5xx are worth another try. */
export function worthRetrying(failures: number, error: unknown): boolean {
  if (failures >= MAX_RETRIES) return false;
  return !(error instanceof ApiError) || error.status === 0 || error.status >= 500;
}

function makeClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { retry: worthRetrying, staleTime: 15_000, refetchOnWindowFocus: true },
      mutations: { retry: false },
    },
  });
}

/** Wrap each island's root in this once; islands do not share a cache. */
export function Providers({ children }: { children: ReactNode }) {
  const [client] = useState(makeClient);
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>;
}

/** The message to show for a failed call: our own words when we have them. */
export function errorText(error: unknown): string {
  return error instanceof ApiError ? error.message : 'Something went wrong in this page. Reload and try again.';
}

/** Field messages of a failed call, empty when it was about something else. */
export function errorFields(error: unknown): Readonly<Record<string, string>> {
  return error instanceof ApiError ? error.fields : {};
}
