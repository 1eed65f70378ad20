import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { ApiError } from '#src/lib/api.ts';

/** A refusal for want of a session means that it ended (a wrong password is another matter): forget it and let the shell ask for sign-in. */
function onError(error: unknown): void {
  if (error instanceof ApiError && error.problem.code === 'not-signed-in') queryClient.setQueryData(['session'], null);
}

export const queryClient: QueryClient = new QueryClient({
  queryCache: new QueryCache({ onError }),
  mutationCache: new MutationCache({ onError }),
  defaultOptions: {
    queries: {
      staleTime: 30_000,
      retry: (count, error) => (error instanceof ApiError && error.status > 0 ? false : count < 2),
    },
  },
});
