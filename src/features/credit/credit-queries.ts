import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { type CreditView, creditApi, type creditYearBody } from '#shared/api/credit.ts';
import { call } from '#src/lib/api.ts';

export type CreditYearBody = z.infer<typeof creditYearBody>;

export const creditQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'credit'],
    queryFn: ({ signal }) => call(creditApi.view, { params: { householdId }, signal }),
  });

/** Keeps the answered view and lets every other screen of the household ask again. */
function useKept(householdId: string) {
  const client = useQueryClient();
  return (view: CreditView) => {
    client.setQueryData(creditQuery(householdId).queryKey, view);
    return client.invalidateQueries({ queryKey: ['household', householdId] });
  };
}

export function usePutYear(householdId: string) {
  return useMutation({
    mutationFn: ({ taxYear, body }: { taxYear: number; body: CreditYearBody }) =>
      call(creditApi.putYear, { params: { householdId, taxYear: String(taxYear) }, body }),
    onSuccess: useKept(householdId),
  });
}

export function useRemoveYear(householdId: string) {
  return useMutation({
    mutationFn: (taxYear: number) => call(creditApi.removeYear, { params: { householdId, taxYear: String(taxYear) } }),
    onSuccess: useKept(householdId),
  });
}

export function useAddPaper(householdId: string) {
  return useMutation({
    mutationFn: (file: File) => call(creditApi.addPaper, { params: { householdId }, file }),
    onSuccess: useKept(householdId),
  });
}
