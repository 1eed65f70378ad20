import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { type costBody, type loanPaymentBody, moneyApi } from '#shared/api/money.ts';
import { type LeaseBody, moneyOtherApi, type OtherLoanBody } from '#shared/api/money-other.ts';
import { call } from '#src/lib/api.ts';

export const otherMoneyQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'other-money'],
    queryFn: ({ signal }) => call(moneyOtherApi.view, { params: { householdId }, signal }),
  });

export type CostBody = z.infer<typeof costBody>;
export type PaymentBody = z.infer<typeof loanPaymentBody>;

/** What can be recorded, changed or taken back of costs, other loans and the lease. */
export type OtherChange =
  | { kind: 'addCost'; body: CostBody }
  | { kind: 'changeCost'; id: string; body: CostBody }
  | { kind: 'removeCost' | 'removeLoan'; id: string }
  | { kind: 'addLoan'; body: OtherLoanBody }
  | { kind: 'changeLoan'; id: string; body: OtherLoanBody }
  | { kind: 'addPayment'; id: string; body: PaymentBody }
  | { kind: 'removePayment'; id: string; paymentId: string }
  | { kind: 'putLease'; body: LeaseBody }
  | { kind: 'removeLease' };

function send(householdId: string, change: OtherChange): Promise<unknown> {
  const params = { householdId };
  switch (change.kind) {
    case 'addCost':
      return call(moneyApi.addCost, { params, body: change.body });
    case 'changeCost':
      return call(moneyOtherApi.changeCost, { params: { ...params, id: change.id }, body: change.body });
    case 'removeCost':
      return call(moneyApi.removeCost, { params: { ...params, id: change.id } });
    case 'addLoan':
      return call(moneyOtherApi.addLoan, { params, body: change.body });
    case 'changeLoan':
      return call(moneyOtherApi.changeLoan, { params: { ...params, id: change.id }, body: change.body });
    case 'removeLoan':
      return call(moneyOtherApi.removeLoan, { params: { ...params, id: change.id } });
    case 'addPayment':
      return call(moneyOtherApi.addPayment, { params: { ...params, id: change.id }, body: change.body });
    case 'removePayment':
      return call(moneyOtherApi.removePayment, { params: { ...params, id: change.id, paymentId: change.paymentId } });
    case 'putLease':
      return call(moneyOtherApi.putLease, { params, body: change.body });
    case 'removeLease':
      return call(moneyOtherApi.removeLease, { params });
  }
}

/** Makes one change; every screen of the household asks again before the change counts as made. */
export function useOtherChange(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: OtherChange) => send(householdId, change),
    onSuccess: () => client.invalidateQueries({ queryKey: ['household', householdId] }),
  });
}
