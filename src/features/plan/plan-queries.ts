import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { cyclesApi } from '#shared/api/cycles.ts';
import { planApi } from '#shared/api/plan.ts';
import { setupApi } from '#shared/api/setup.ts';
import type { PlanInForce } from '#shared/facts/household.ts';
import type { Opening } from '#shared/settlement/settlement.ts';
import type { Day } from '#shared/units/day.ts';
import { call } from '#src/lib/api.ts';

/** The household's plans stand in the set-up's view, under the set-up's own key. */
export function plansQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'setup'],
    queryFn: ({ signal }) => call(setupApi.view, { params: { householdId }, signal }),
  });
}

/** The household's cycles, under their own key: what a change of plans would settle again. */
export function cyclesQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'cycles'],
    queryFn: ({ signal }) => call(cyclesApi.list, { params: { householdId }, signal }),
  });
}

/** A month worked on a plan as far as it is written; the last answer stays until the next is there. */
export function exampleQuery(householdId: string, planText: string, to: string | null) {
  return queryOptions({
    queryKey: ['household', householdId, 'planExample', planText, to],
    queryFn: ({ signal }) =>
      call(planApi.example, {
        params: { householdId },
        body: { plan: JSON.parse(planText), to: to as Day | null },
        signal,
      }),
    placeholderData: keepPreviousData,
    gcTime: 60_000,
  });
}

export function useTrial(householdId: string) {
  return useMutation({
    mutationFn: (body: { plan: unknown; cycles: 'year' | 'all' }) =>
      call(planApi.trial, { params: { householdId }, body }),
  });
}

export function useSavePlans(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { plans: PlanInForce[]; opening: Opening }) =>
      call(setupApi.plan, { params: { householdId }, body }),
    onSuccess: (view) => {
      client.setQueryData(plansQuery(householdId).queryKey, view);
      void client.invalidateQueries({
        queryKey: ['household', householdId],
        predicate: (query) => query.queryKey[2] !== 'setup',
      });
    },
  });
}
