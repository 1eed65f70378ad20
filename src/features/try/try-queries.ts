import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type TryView, tryApi } from '#shared/api/try.ts';
import type { Levers } from '#shared/facts/scenario.ts';
import { call } from '#src/lib/api.ts';

/** What a try starts from, and the changes kept by name. */
export const tryQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'try'],
    queryFn: ({ signal }) => call(tryApi.view, { params: { householdId }, signal }),
  });

/** Keeping and removing touch no other screen: only this view is put in its place. */
function useShowAnswer(householdId: string) {
  const client = useQueryClient();
  return (view: TryView) => client.setQueryData(tryQuery(householdId).queryKey, view);
}

export function useKeep(householdId: string) {
  return useMutation({
    mutationFn: ({ id, name, levers }: { id: string; name: string; levers: Levers }) =>
      call(tryApi.keep, { params: { householdId, id }, body: { name, levers } }),
    onSuccess: useShowAnswer(householdId),
  });
}

export function useRemove(householdId: string) {
  return useMutation({
    mutationFn: (id: string) => call(tryApi.remove, { params: { householdId, id } }),
    onSuccess: useShowAnswer(householdId),
  });
}
