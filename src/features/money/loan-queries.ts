import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { type loanPaymentBody, moneyApi } from '#shared/api/money.ts';
import {
  type loanBalanceBody,
  type loanContractBody,
  moneyLoanApi,
  type refinanceBody,
} from '#shared/api/money-loan.ts';
import { call } from '#src/lib/api.ts';

export type ContractBody = z.infer<typeof loanContractBody>;
export type LoanBalanceBody = z.infer<typeof loanBalanceBody>;
export type RefinanceBody = z.infer<typeof refinanceBody>;
export type LoanPaymentBody = z.infer<typeof loanPaymentBody>;

const loanKey = (householdId: string) => ['household', householdId, 'loan'];

export const loanQuery = (householdId: string) =>
  queryOptions({
    queryKey: loanKey(householdId),
    queryFn: ({ signal }) => call(moneyLoanApi.view, { params: { householdId }, signal }),
  });

export const payoffQuery = (householdId: string, on: string) =>
  queryOptions({
    queryKey: [...loanKey(householdId), 'payoff', on],
    queryFn: ({ signal }) => call(moneyLoanApi.payoff, { params: { householdId, on }, signal }),
  });

/** What can be recorded, changed or taken back of the loan. */
export type LoanChange =
  | { kind: 'contract'; body: ContractBody }
  | { kind: 'addPayment'; body: LoanPaymentBody }
  | { kind: 'addBalance'; body: LoanBalanceBody }
  | { kind: 'addRefinance'; body: RefinanceBody }
  | { kind: 'removePayment' | 'removeBalance' | 'removeRefinance'; id: string };

function send(householdId: string, change: LoanChange): Promise<unknown> {
  const params = { householdId };
  switch (change.kind) {
    case 'contract':
      return call(moneyLoanApi.putContract, { params, body: change.body });
    case 'addPayment':
      return call(moneyApi.addLoanPayment, { params, body: change.body });
    case 'addBalance':
      return call(moneyLoanApi.addBalance, { params, body: change.body });
    case 'addRefinance':
      return call(moneyLoanApi.addRefinance, { params, body: change.body });
    case 'removePayment':
      return call(moneyApi.removeLoanPayment, { params: { ...params, id: change.id } });
    case 'removeBalance':
      return call(moneyLoanApi.removeBalance, { params: { ...params, id: change.id } });
    case 'removeRefinance':
      return call(moneyLoanApi.removeRefinance, { params: { ...params, id: change.id } });
  }
}

/** Makes one change; every screen of the household asks again before the change counts as made. */
export function useLoanChange(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: LoanChange) => send(householdId, change),
    onSuccess: () => client.invalidateQueries({ queryKey: ['household', householdId] }),
  });
}
