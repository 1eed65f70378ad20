import type { CostsView, LeaseView, OtherLoanView, OtherMoneyView } from '#shared/api/money-other.ts';
import type { Entry } from '#shared/books/book.ts';
import { costDays } from '#shared/books/cost-days.ts';
import { costEntries } from '#shared/books/costs.ts';
import { leaseFlows, leaseMissing } from '#shared/books/lease.ts';
import { loanPayoff } from '#shared/books/loan.ts';
import { loanBook } from '#shared/books/loan-book.ts';
import { isOfOtherLoan } from '#shared/books/other-money.ts';
import type { LeaseFacts, OtherLoan } from '#shared/facts/finance.ts';
import { type CostFacts, costKind, INCOME_KINDS } from '#shared/facts/house.ts';
import { productionOf } from '#shared/ledger/compute-ledger.ts';
import type { Figure } from '#shared/position/position.ts';
import { sumOfEntries } from '#shared/position/sums.ts';
import { negateCents, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, type Day, yearOf } from '#shared/units/day.ts';
import type { Deps } from '../../deps.ts';
import { type HouseholdLedger, ledgerOf } from '../ledger-of.ts';

/** Costs and incomes, other loans and the lease as they stand today. */
export function viewOtherMoney(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): OtherMoneyView {
  const household = ledgerOf(deps, householdId);
  const { facts } = household;
  return {
    costs: costsView(household),
    loans: facts.otherLoans.map((other) => otherLoanView(household, other)),
    lease: facts.lease === null ? null : leaseView(household, facts.lease),
  };
}

function costsView({ facts, ledger, today }: HouseholdLedger): CostsView {
  const entries = ledger.entries.filter(({ book }) => book === 'upkeep' || book === 'costs');
  const incomes = entries.filter(isIncome);
  const byYear = new Map<string, Entry[]>();
  for (const entry of entries) {
    const key = `${yearOf(entry.date)} ${entry.kind}`;
    byYear.set(key, [...(byYear.get(key) ?? []), entry]);
  }
  return {
    costs: facts.costs,
    standings: facts.costs.map((cost) => {
      const own = costEntries([cost], today, facts.documents);
      const [first] = own;
      return {
        id: cost.id,
        times: own.length,
        toDateCents: sumCents(own.map(({ amountCents }) => amountCents)),
        nextOn: nextDay(cost, today),
        each: first === undefined ? null : { amountCents: first.amountCents, working: first.working },
      };
    }),
    totals: [...byYear.values()].flatMap((group) => {
      const [first] = group;
      if (first === undefined) return [];
      const kind = costKind.parse(first.kind);
      return [{ year: yearOf(first.date), kind, amount: sumOfEntries(`${yearOf(first.date)}`, group) }];
    }),
    paid: sumOfEntries(
      'Costs paid',
      entries.filter((entry) => !isIncome(entry)),
    ),
    received: sumOfEntries('Incomes received', incomes),
  };
}

function isIncome({ kind }: Entry): boolean {
  return INCOME_KINDS.some((income) => income === kind);
}

function nextDay(cost: CostFacts, today: Day): Day | null {
  const from = cost.on > today ? cost.on : today;
  return costDays(cost, addMonths(from, 13)).find((on) => on > today) ?? null;
}

function otherLoanView({ ledger, today }: HouseholdLedger, { id, kind, loan }: OtherLoan): OtherLoanView {
  const { levelCents, rows } = loanBook(loan);
  const own = ledger.entries.filter((entry) => isOfOtherLoan(entry, id));
  return {
    id,
    kind,
    facts: loan,
    paymentCents: levelCents,
    paidCents: negateCents(sumCents(own.map(({ amountCents }) => amountCents))),
    payoff: loanPayoff(loan, today),
    payoffOn: today,
    lastPaymentOn: rows.at(-1)?.on ?? null,
  };
}

/** What went out, as a positive sum. */
function asPaid({ amountCents, working }: Figure): Figure {
  return { amountCents: negateCents(amountCents), working: { ...working, formula: `-(${working.formula})` } };
}

function leaseView({ ledger, today }: HouseholdLedger, lease: LeaseFacts): LeaseView {
  const endsOn = addMonths(lease.firstPaymentOn, lease.termMonths);
  const [next] = leaseFlows(lease, addDays(today, 1), endsOn);
  return {
    facts: lease,
    paid: asPaid(
      sumOfEntries(
        lease.kind === 'lease' ? 'Lease payments' : 'Power bought',
        ledger.entries.filter(({ id }) => id.startsWith('lease-')),
      ),
    ),
    next: next === undefined ? null : { on: next.on, amountCents: negateCents(next.amountCents) },
    endsOn,
    missing: leaseMissing(
      lease,
      ledger.cycles.map((cycle) => productionOf({ cycle })),
    ),
  };
}
