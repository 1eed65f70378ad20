import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { moneyPapersApi, type PapersView, type paperLinkBody } from '#shared/api/money-papers.ts';
import { call } from '#src/lib/api.ts';

export const papersQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'papers'],
    queryFn: ({ signal }) => call(moneyPapersApi.list, { params: { householdId }, signal }),
  });

/** Keeps the answered list; the rest of the household asks again, since a figure may name another paper now. */
function useKept(householdId: string) {
  const client = useQueryClient();
  return (view: PapersView) => {
    client.setQueryData(papersQuery(householdId).queryKey, view);
    return client.invalidateQueries({ queryKey: ['household', householdId] });
  };
}

/** Sends a file; it stands behind nothing until it is chosen for something. */
export function useAddPaper(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (file: File) => call(moneyPapersApi.add, { params: { householdId }, file }),
    onSuccess: ({ view }) => client.setQueryData(papersQuery(householdId).queryKey, view),
  });
}

export function useLinkPaper(householdId: string) {
  const kept = useKept(householdId);
  return useMutation({
    mutationFn: (body: z.infer<typeof paperLinkBody>) => call(moneyPapersApi.link, { params: { householdId }, body }),
    onSuccess: kept,
  });
}

export function useRemovePaper(householdId: string) {
  const kept = useKept(householdId);
  return useMutation({
    mutationFn: (documentId: string) => call(moneyPapersApi.remove, { params: { householdId, documentId } }),
    onSuccess: kept,
  });
}
