import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { type MoneyView, moneyApi, type receiptBody } from '#shared/api/money.ts';
import { call } from '#src/lib/api.ts';

export const moneyQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'money'],
    queryFn: ({ signal }) => call(moneyApi.view, { params: { householdId }, signal }),
  });

/** What can be recorded or taken back on the Money screen. */
export type MoneyChange =
  | { kind: 'receipt'; body: z.infer<typeof receiptBody> }
  | { kind: 'removeReceipt'; id: string };

/** Makes one change and keeps the answered view; every other screen of the household asks again. */
export function useMoneyChange(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: MoneyChange): Promise<MoneyView> => {
      const params = { householdId };
      switch (change.kind) {
        case 'receipt':
          return call(moneyApi.addReceipt, { params, body: change.body });
        case 'removeReceipt':
          return call(moneyApi.removeReceipt, { params: { householdId, id: change.id } });
      }
    },
    onSuccess: (view) => {
      client.setQueryData(moneyQuery(householdId).queryKey, view);
      return client.invalidateQueries({ queryKey: ['household', householdId] });
    },
  });
}
