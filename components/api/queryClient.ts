import { QueryClient } from '@tanstack/react-query';
import { isTransient } from './problem';

/** How long an answer counts as fresh, milliseconds. Name the kind of thing, not the number. */
export const stale = {
  /** What other people change while one looks: the desk, the bench queue, a loan. */
  live: 10_000,
  /** Kits, stones, people. */
  usual: 60_000,
  /** School settings, species, instruments. */
  settled: 10 * 60_000,
} as const;

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: stale.usual,
        retry: (count, error) => count < 2 && isTransient(error),
        refetchOnWindowFocus: true,
      },
      // A write is repeated only where it carries an idempotency key: see useIdempotentMutation.
      mutations: { retry: false },
    },
  });
}
