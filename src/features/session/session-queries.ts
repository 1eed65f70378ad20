import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sessionApi } from '#shared/api/session.ts';
import { call } from '#src/lib/api.ts';
import { changeSession } from '#src/lib/session.ts';

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { email: string; password: string }) => call(sessionApi.signIn, { body }),
    onSuccess: (session) => changeSession(client, session),
  });
}

export function useSignUp() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; email: string; password: string }) => call(sessionApi.signUp, { body }),
    onSuccess: (session) => changeSession(client, session),
  });
}
