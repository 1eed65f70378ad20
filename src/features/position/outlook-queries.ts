import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { outlookApi } from '#shared/api/outlook.ts';
import type { Assumptions } from '#shared/facts/household.ts';
import { call } from '#src/lib/api.ts';

export const outlookQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'outlook'],
    queryFn: ({ signal }) => call(outlookApi.view, { params: { householdId }, signal }),
  });

/** Saves the assumptions and keeps the answered outlook; every other screen of the household asks again. */
export function useSaveAssumptions(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: Assumptions) => call(outlookApi.saveAssumptions, { params: { householdId }, body }),
    onSuccess: (view) => {
      client.setQueryData(outlookQuery(householdId).queryKey, view);
      return client.invalidateQueries({ queryKey: ['household', householdId] });
    },
  });
}
