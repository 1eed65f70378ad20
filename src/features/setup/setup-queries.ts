import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { Endpoint } from '#shared/api/endpoint.ts';
import { type SetupStep, type SetupView, setupApi } from '#shared/api/setup.ts';
import { call } from '#src/lib/api.ts';
import { sessionQuery } from '#src/lib/session.ts';

export function setupQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'setup'],
    queryFn: ({ signal }) => call(setupApi.view, { params: { householdId }, signal }),
  });
}

/** Keeps the answered view and lets every other figure of the household be asked for again. */
function useKeepView(householdId: string) {
  const client = useQueryClient();
  return (view: SetupView) => {
    const { queryKey } = setupQuery(householdId);
    client.setQueryData(queryKey, view);
    void client.invalidateQueries({
      queryKey: ['household', householdId],
      predicate: (query) => query.queryKey[2] !== 'setup',
    });
  };
}

export function useSaveStep<B>(householdId: string, endpoint: Endpoint<B, SetupView>) {
  const keep = useKeepView(householdId);
  return useMutation({
    mutationFn: (body: B) => call(endpoint, { params: { householdId }, body }),
    onSuccess: keep,
  });
}

export function useSkipStep(householdId: string) {
  const keep = useKeepView(householdId);
  return useMutation({
    mutationFn: (step: SetupStep) => call(setupApi.skip, { params: { householdId }, body: { step } }),
    onSuccess: keep,
  });
}

/** Makes a household; its maker becomes an owner. The session is asked for again, so that the household can be opened. */
export function useCreateHousehold() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: async (body: { name: string; timeZone: string }) => {
      const made = await call(setupApi.create, { body });
      await client.fetchQuery({ ...sessionQuery, staleTime: 0 });
      return made;
    },
  });
}
