import { QueryClient } from '@tanstack/react-query';
import { ProblemError } from './problem-error.ts';

/** A refusal is an answer; only a missing answer is worth asking again, and not without a connection. */
function shouldRetry(failures: number, error: Error): boolean {
  if (!navigator.onLine) return false;
  if (error instanceof ProblemError && error.status < 500) return false;
  return failures < 2;
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      // Without a connection a request fails at once and is shown so, instead of waiting unseen.
      queries: {
        networkMode: 'always',
        retry: shouldRetry,
        staleTime: 15_000,
        refetchOnWindowFocus: false,
      },
      mutations: { networkMode: 'always', retry: false },
    },
  });
}
