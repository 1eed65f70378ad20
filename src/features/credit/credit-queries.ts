import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import {
  type CreditView,
  type carriedInBody,
  creditApi,
  type creditCostBody,
  type creditYearBody,
} from '#shared/api/credit.ts';
import type { CreditPaperKind } from '#shared/books/credit-paper.ts';
import { call } from '#src/lib/api.ts';

export type CreditYearBody = z.infer<typeof creditYearBody>;
export type CreditCostBody = z.infer<typeof creditCostBody>;
export type CarriedInBody = z.infer<typeof carriedInBody>;

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

export function usePutCost(householdId: string) {
  return useMutation({
    mutationFn: ({ id, body }: { id: string; body: CreditCostBody }) =>
      call(creditApi.putCost, { params: { householdId, id }, body }),
    onSuccess: useKept(householdId),
  });
}

export function usePutCarriedIn(householdId: string) {
  return useMutation({
    mutationFn: (body: CarriedInBody) => call(creditApi.putCarriedIn, { params: { householdId }, body }),
    onSuccess: useKept(householdId),
  });
}

export function useAddPaper(householdId: string) {
  return useMutation({
    mutationFn: ({ file, kind }: { file: File; kind: CreditPaperKind | null }) =>
      call(creditApi.addPaper, { params: { householdId }, file, fields: kind === null ? {} : { kind } }),
    onSuccess: useKept(householdId),
  });
}

export function usePutPaperKind(householdId: string) {
  return useMutation({
    mutationFn: ({ documentId, kind }: { documentId: string; kind: CreditPaperKind }) =>
      call(creditApi.putPaperKind, { params: { householdId, documentId }, body: { kind } }),
    onSuccess: useKept(householdId),
  });
}
