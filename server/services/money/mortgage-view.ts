import type { MortgageScheduleRow, MortgageView } from '#shared/api/money-mortgage.ts';
import { mortgageBook, mortgagePaymentDay } from '#shared/books/mortgage-balance.ts';
import { removalChecklist } from '#shared/books/mortgage-checklist.ts';
import { currentValueRule } from '#shared/books/mortgage-current-value.ts';
import { governingEnd, insuranceEnds } from '#shared/books/mortgage-ends.ts';
import { premiumOn } from '#shared/books/mortgage-premium.ts';
import { latestValue, ltvPercent, mortgageBalanceOn } from '#shared/books/mortgage-value.ts';
import { mortgageWarnings } from '#shared/books/mortgage-warnings.ts';
import type { MortgageFacts } from '#shared/facts/finance.ts';
import { sumCents, ZERO_CENTS } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { Deps } from '../../deps.ts';
import { type HouseholdLedger, ledgerOf } from '../ledger-of.ts';

/** The mortgage as it stands today: its schedule, its value, when its insurance could go, and what a request rests on. */
export function viewMortgage(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): { mortgage: MortgageView | null } {
  const household = ledgerOf(deps, householdId);
  const { mortgage } = household.facts;
  return { mortgage: mortgage === null ? null : mortgageViewOf(household, mortgage) };
}

function mortgageViewOf({ facts, ledger, today }: HouseholdLedger, mortgage: MortgageFacts): MortgageView {
  const papers = facts.documents;
  const balance = mortgageBalanceOn(mortgage, today, papers);
  const improvedOn = facts.house.switchOn ?? facts.credit?.placedInServiceOn ?? null;
  const currentValue = currentValueRule(mortgage, balance, { today, improvedOn, papers });
  const security = facts.loan?.security ?? null;
  const latest = latestValue(mortgage, today);
  const governing = mortgage.insurance === null ? null : governingEnd(mortgage);
  return {
    facts: mortgage,
    paymentCents: mortgageBook(mortgage).paymentCents,
    balance,
    balanceOn: today,
    originalPercent: ltvPercent(balance.amountCents, mortgage.originalValueCents),
    latest: latest && {
      valueCents: latest.valueCents,
      on: latest.on,
      percent: ltvPercent(balance.amountCents, latest.valueCents),
    },
    premiumCents: mortgage.insurance === null ? null : premiumOn(mortgage, today),
    avoidedCents: sumCents(
      ledger.entries
        .filter(({ book, basis }) => book === 'insurance' && basis !== 'memo')
        .map((one) => one.amountCents),
    ),
    ends: insuranceEnds(mortgage).map(({ rule, on, payment, words, source, most }) => ({
      rule,
      on,
      payment,
      words,
      source,
      most,
    })),
    governs: governing && { rule: governing.rule, on: governing.on, words: governing.words },
    currentValue,
    checklist: removalChecklist(mortgage, currentValue, balance, { today, security }),
    warnings: mortgageWarnings(mortgage, security),
    schedule: mortgageSchedule(mortgage, today),
  };
}

/** The mortgage month by month as paid, beside the initial schedule. */
export function mortgageSchedule(mortgage: MortgageFacts, today: Day): MortgageScheduleRow[] {
  const { initial, actual } = mortgageBook(mortgage);
  return actual.map((row) => {
    const on = mortgagePaymentDay(mortgage, row.number);
    return {
      number: row.number,
      on,
      paymentCents: row.paymentCents,
      interestCents: row.interestCents,
      principalCents: row.principalCents,
      extraPrincipalCents: row.extraPrincipalCents,
      balanceCents: row.balanceCents,
      initialCents: initial[row.number - 1]?.balanceCents ?? ZERO_CENTS,
      stated: row.stated !== null,
      driftCents: row.driftCents,
      past: on <= today,
    };
  });
}
