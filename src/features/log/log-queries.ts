import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { cyclesApi, type StatementBody } from '#shared/api/cycles.ts';
import { type LogDraft, logApi, type ProductionMapping } from '#shared/api/log.ts';
import { setupApi } from '#shared/api/setup.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import { call } from '#src/lib/api.ts';

export function logQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'log'],
    queryFn: ({ signal }) => call(logApi.draft, { params: { householdId }, signal }),
  });
}

/** What the house has stated, for filling a typed statement in with the plan's lines and the meters. */
export function statedQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'setup'],
    queryFn: ({ signal }) => call(setupApi.view, { params: { householdId }, signal }),
  });
}

/** The statement of the last posted cycle, which the next one follows on from; null before the first. */
export function lastStatementQuery(householdId: string) {
  return queryOptions({
    queryKey: ['household', householdId, 'last-statement'],
    queryFn: async ({ signal }) => {
      const { rows } = await call(cyclesApi.list, { params: { householdId }, signal });
      const last = rows.reduce<string | null>(
        (latest, row) => (latest === null || row.to > latest ? row.to : latest),
        null,
      );
      if (last === null) return null;
      const { cycle } = await call(cyclesApi.one, { params: { householdId, to: last }, signal });
      return cycle.statement;
    },
  });
}

export type Upload = { kind: 'statement'; file: File } | { kind: 'readings'; file: File; channel: IntervalChannel };

/** Each change of the draft answers the whole draft, which is kept. */
function useDraftChange<V>(
  householdId: string,
  change: (given: V, params: { householdId: string }) => Promise<LogDraft>,
) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: V) => change(given, { householdId }),
    onSuccess: (draft) => {
      client.setQueryData(logQuery(householdId).queryKey, draft);
    },
  });
}

export const useUpload = (householdId: string) =>
  useDraftChange(householdId, (given: Upload, params) =>
    given.kind === 'statement'
      ? call(logApi.addStatementFile, { params, file: given.file })
      : call(logApi.addProductionFile, { params, file: given.file, fields: { channel: given.channel } }),
  );

export const useAddStatement = (householdId: string) =>
  useDraftChange(householdId, (statement: StatementBody, params) =>
    call(logApi.addStatement, { params, body: { statement } }),
  );

export const useChangeStatement = (householdId: string) =>
  useDraftChange(householdId, ({ key, statement }: { key: string; statement: StatementBody }, params) =>
    call(logApi.changeStatement, { params: { ...params, key }, body: { statement } }),
  );

export const useRemoveStatement = (householdId: string) =>
  useDraftChange(householdId, (key: string, params) => call(logApi.removeStatement, { params: { ...params, key } }));

export const useKeepGoodRows = (householdId: string) =>
  useDraftChange(householdId, ({ documentId, keep }: { documentId: string; keep: boolean }, params) =>
    call(logApi.keepGoodRows, { params: { ...params, documentId }, body: { keep } }),
  );

export const useRemoveFile = (householdId: string) =>
  useDraftChange(householdId, (documentId: string, params) =>
    call(logApi.removeFile, { params: { ...params, documentId } }),
  );

export const useChangeMapping = (householdId: string) =>
  useDraftChange(householdId, ({ key, mapping }: { key: string; mapping: ProductionMapping }, params) =>
    call(logApi.changeMapping, { params: { ...params, key }, body: mapping }),
  );

export const useDiscard = (householdId: string) =>
  useDraftChange(householdId, (_: undefined, params) => call(logApi.discard, { params }));

/** Makes the draft a fact; everything of the household is asked for again. */
export function usePost(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (replaceReadings: boolean) => call(logApi.post, { params: { householdId }, body: { replaceReadings } }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['household', householdId] }),
  });
}
