import { QueryClient } from '@tanstack/react-query';
import { ProblemError } from '../lib/problem-error.ts';

/** A refusal (4xx) is an answer and is shown at once; a server's or network's fault is tried twice more. */
function isWorthRetrying(failureCount: number, error: Error): boolean {
  if (error instanceof ProblemError && error.status >= 400 && error.status < 500) return false;
  return failureCount < 2;
}

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: { retry: isWorthRetrying, staleTime: 10_000, refetchOnWindowFocus: true },
    mutations: { retry: false },
  },
});
