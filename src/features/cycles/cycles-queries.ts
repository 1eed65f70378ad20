import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { cyclesApi, type StatementBody } from '#shared/api/cycles.ts';
import { call } from '#src/lib/api.ts';

export const cyclesQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'cycles'],
    queryFn: ({ signal }) => call(cyclesApi.list, { params: { householdId }, signal }),
  });

export const cycleQuery = (householdId: string, to: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'cycles', to],
    queryFn: ({ signal }) => call(cyclesApi.one, { params: { householdId, to }, signal }),
  });

/** Lets a differing check stand with a note, or takes that back. */
export function useAccept(householdId: string, to: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: { check: string; note: string | null }) => {
      const params = { householdId, to };
      return given.note === null
        ? call(cyclesApi.withdrawAccept, { params, body: { check: given.check } })
        : call(cyclesApi.accept, { params, body: { check: given.check, note: given.note } });
    },
    onSuccess: (view) => {
      client.setQueryData(cycleQuery(householdId, to).queryKey, view);
      return client.invalidateQueries({ queryKey: ['household', householdId] });
    },
  });
}

/** Corrects a statement: a new revision with a reason. Answers the cycle's last day, which the correction may have moved. */
export function useCorrect(householdId: string, to: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { statement: StatementBody; reason: string }) =>
      call(cyclesApi.correct, { params: { householdId, to }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['household', householdId] }),
  });
}
