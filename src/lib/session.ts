import { type QueryClient, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type SessionView, sessionApi } from '#shared/api/session.ts';
import { call } from './api.ts';

/** Who is signed in and which households they may open; null when nobody is. */
export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => call(sessionApi.current, { signal }),
  staleTime: Number.POSITIVE_INFINITY,
});

/** Takes another person's figures out of memory before the session changes hands. */
export function changeSession(client: QueryClient, session: SessionView | null): void {
  client.removeQueries({ predicate: (query) => query.queryKey[0] !== sessionQuery.queryKey[0] });
  client.setQueryData(sessionQuery.queryKey, session);
}

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => call(sessionApi.signOut),
    onSuccess: () => changeSession(client, null),
  });
}
