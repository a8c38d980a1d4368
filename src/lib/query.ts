import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { ApiProblem } from '#src/lib/problem.ts';

/** A lost connection or a fault is worth another try; a refusal is an answer. */
function worthRetrying(failures: number, error: unknown): boolean {
  if (!(error instanceof ApiProblem)) return false;
  return failures < 2 && (error.code === 'unreachable' || error.status >= 500);
}

/** An ended session shows wherever it is met first: the gate then asks to sign in. */
function watchSession(error: unknown, client: QueryClient): void {
  if (error instanceof ApiProblem && error.code === 'not-signed-in')
    void client.invalidateQueries({ queryKey: ['session'] });
}

export function createQueryClient(): QueryClient {
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({ onError: (error) => watchSession(error, client) }),
    mutationCache: new MutationCache({ onError: (error) => watchSession(error, client) }),
    defaultOptions: {
      queries: { retry: worthRetrying, staleTime: 5_000, refetchOnWindowFocus: true, networkMode: 'always' },
      mutations: { retry: false, networkMode: 'always' },
    },
  });
  return client;
}
