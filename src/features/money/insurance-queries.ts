import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import {
  type appraisalBody,
  moneyMortgageApi,
  type mortgageBalanceBody,
  type mortgageEndBody,
  type mortgagePremiumsBody,
  type mortgageRecordBody,
} from '#shared/api/money-mortgage.ts';
import { call } from '#src/lib/api.ts';

export type AppraisalBody = z.infer<typeof appraisalBody>;
export type BalanceBody = z.infer<typeof mortgageBalanceBody>;
export type RecordBody = z.infer<typeof mortgageRecordBody>;
export type EndBody = z.infer<typeof mortgageEndBody>;
export type PremiumsBody = z.infer<typeof mortgagePremiumsBody>;

export const mortgageQuery = (householdId: string) =>
  queryOptions({
    queryKey: ['household', householdId, 'mortgage'],
    queryFn: ({ signal }) => call(moneyMortgageApi.view, { params: { householdId }, signal }),
  });

/** What can be recorded, changed or taken back beside the mortgage's terms. */
export type MortgageChange =
  | { kind: 'addAppraisal'; body: AppraisalBody }
  | { kind: 'addBalance'; body: BalanceBody }
  | { kind: 'removeAppraisal' | 'removeBalance'; id: string }
  | { kind: 'putRecord'; body: RecordBody }
  | { kind: 'putEnd'; body: EndBody }
  | { kind: 'putPremiums'; body: PremiumsBody };

function send(householdId: string, change: MortgageChange) {
  const params = { householdId };
  switch (change.kind) {
    case 'addAppraisal':
      return call(moneyMortgageApi.addAppraisal, { params, body: change.body });
    case 'addBalance':
      return call(moneyMortgageApi.addBalance, { params, body: change.body });
    case 'removeAppraisal':
      return call(moneyMortgageApi.removeAppraisal, { params: { ...params, id: change.id } });
    case 'removeBalance':
      return call(moneyMortgageApi.removeBalance, { params: { ...params, id: change.id } });
    case 'putRecord':
      return call(moneyMortgageApi.putRecord, { params, body: change.body });
    case 'putEnd':
      return call(moneyMortgageApi.putEnd, { params, body: change.body });
    case 'putPremiums':
      return call(moneyMortgageApi.putPremiums, { params, body: change.body });
  }
}

/** Makes one change and keeps the answered view; every other screen of the household asks again. */
export function useMortgageChange(householdId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: MortgageChange) => send(householdId, change),
    onSuccess: (view) => {
      client.setQueryData(mortgageQuery(householdId).queryKey, view);
      return client.invalidateQueries({ queryKey: ['household', householdId] });
    },
  });
}
