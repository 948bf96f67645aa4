import { QueryClient } from '@tanstack/react-query';
import { ProblemError } from './problem-error.ts';

/** A refusal is an answer; only a missing answer is worth asking again. */
function shouldRetry(failures: number, error: Error): boolean {
  if (error instanceof ProblemError && error.status < 500) return false;
  return failures < 2;
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { retry: shouldRetry, staleTime: 15_000, refetchOnWindowFocus: false },
      mutations: { retry: false },
    },
  });
}
