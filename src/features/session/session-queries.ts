import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { sessionApi } from '#shared/api/session.ts';
import { call } from '#src/lib/api.ts';

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => call(sessionApi.current, { signal }),
  staleTime: Number.POSITIVE_INFINITY,
});

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { email: string; password: string }) => call(sessionApi.signIn, { body }),
    onSuccess: (session) => {
      client.clear();
      client.setQueryData(sessionQuery.queryKey, session);
    },
  });
}

export function useSignUp() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; email: string; password: string }) => call(sessionApi.signUp, { body }),
    onSuccess: (session) => {
      client.clear();
      client.setQueryData(sessionQuery.queryKey, session);
    },
  });
}

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => call(sessionApi.signOut),
    onSuccess: () => {
      client.clear();
      client.setQueryData(sessionQuery.queryKey, null);
    },
  });
}
