import { loanPayoff } from '../books/loan.ts';
import { loanBook } from '../books/loan-book.ts';
import type { LoanFacts } from '../facts/finance.ts';
import type { Levers } from '../facts/scenario.ts';
import { sayDate, sayKwh, sayMoney } from '../ledger/say.ts';
import type { BasisFacts, Flow, ProjectionBasis } from '../position/basis.ts';
import type { Changes } from '../position/changes.ts';
import { energyFrom, type Period, type PeriodEnergy } from '../position/periods.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { planWithoutRoof } from '../settlement/without-roof.ts';
import { cents, negateCents } from '../units/cents.ts';
import { addMonths, daysBetween, latestDay } from '../units/day.ts';
import { type HourlyExport, shareInHours } from './hourly-export.ts';

/** The basis and changes that pull these levers, with what had to be assumed. All but the export cut, which blends two projections. */
export type Pulled = { basis: ProjectionBasis; changes: Changes; assumed: string[] };

/** Turns levers into changes of the projection. The levers must have no faults. */
export function leverChanges(basis: ProjectionBasis, hourly: HourlyExport, levers: Levers): Pulled {
  const assumed: string[] = [];
  const flows: Flow[] = [];
  const facts: Partial<BasisFacts> = {};
  const close = { ...basis.close };

  const { loan } = basis.facts;
  if (loan !== null && levers.cash) {
    facts.loan = null;
    close.cashSoFarCents = cents(close.cashSoFarCents + asIfCash(loan, basis.close.on));
    assumed.push(
      `The loan’s ${sayMoney(cents(loan.principalCents - loan.dealerFeeCents))} without the dealer’s fee was paid in cash on ${sayDate(loan.fundedOn)}; what that money could have earned elsewhere is not counted.`,
    );
  } else if (loan !== null && (levers.paydown || levers.refinance)) {
    facts.loan = changedLoan(loan, levers);
  }
  if (levers.paydown)
    assumed.push('The lender takes the money as principal on the day; ask whether it re-amortizes, and for what fee.');
  if (levers.refinance)
    assumed.push(
      'The new loan pays the old one off, interest to the day included, and its first payment is a month later.',
    );

  const { priceRise, degradation } = levers;
  if (priceRise !== null || degradation !== null) {
    const { assumptions } = basis.facts;
    facts.assumptions = {
      ...assumptions,
      priceRise: priceRise ?? assumptions.priceRise,
      degradation: degradation ?? assumptions.degradation,
    };
  }
  if (levers.plan) {
    const { from, plan } = levers.plan;
    const now = planFor(basis.facts.plans, from);
    facts.plans = [
      ...basis.facts.plans.filter((one) => one.from < from),
      { from, plan, withoutRoof: now === null ? null : planWithoutRoof(now) },
    ];
    assumed.push('Without the roof the house would stay on its present plan.');
  }
  if (levers.exportCut) {
    assumed.push(
      'What export takes off the bill keeps this share of its worth from that day on, whether the plan nets kilowatt-hours or credits dollars.',
    );
  }
  if (levers.moreUse) assumed.push(moreUseWords(levers.moreUse.whPerDay, hourly));
  if (levers.replacement) {
    flows.push({ on: levers.replacement.on, book: 'upkeep', amountCents: negateCents(levers.replacement.costCents) });
  }
  if (levers.sale) {
    flows.push({ on: levers.sale.on, book: 'costs', amountCents: levers.sale.roofValueCents });
    assumed.push(
      'On the day of the sale every stream ends, the loan is paid off, and what the utility still holds is lost.',
    );
  }
  return {
    basis: levers.cash ? { ...basis, close, evenSince: null } : basis,
    changes: {
      facts,
      flows,
      energy: moreUse(levers.moreUse, hourly),
      plan: null,
      endsOn: levers.sale?.on ?? null,
    },
    assumed,
  };
}

/** What cash so far would differ by at a day: the payments to the lender not made, the cash price paid instead. */
function asIfCash(loan: LoanFacts, on: ProjectionBasis['close']['on']): number {
  const paid = loanBook(loan).steps.reduce((sum, step) => (step.on < on ? sum + step.cashCents : sum), 0);
  return -paid - (loan.principalCents - loan.dealerFeeCents);
}

function changedLoan(loan: LoanFacts, { paydown, refinance }: Levers): LoanFacts {
  const paidDown: LoanFacts =
    paydown === null
      ? loan
      : {
          ...loan,
          payments: [
            ...loan.payments,
            {
              id: 'try-paydown',
              on: paydown.on,
              amountCents: paydown.amountCents,
              extraPrincipalCents: paydown.amountCents,
              note: null,
              reamortize: paydown.reamortize,
              documentId: null,
            },
          ],
        };
  if (refinance === null) return paidDown;
  const principalCents = loanPayoff(paidDown, refinance.on, 'before').amountCents;
  if (principalCents <= 0) return paidDown;
  return {
    ...paidDown,
    refinances: [
      ...paidDown.refinances,
      {
        id: 'try-refinance',
        on: refinance.on,
        lender: '',
        principalCents,
        annualRate: refinance.annualRate,
        termMonths: refinance.termMonths,
        firstPaymentOn: addMonths(refinance.on, 1),
        costsCents: refinance.costsCents,
        documentId: null,
      },
    ],
  };
}

/**
 * More use a day, met by the roof as far as the house sends out in those hours on a mean day of the month, else bought. A mean day meets more than real days
 * do, some bright and some dark: an estimate.
 */
function moreUse(lever: Levers['moreUse'], hourly: HourlyExport): Changes['energy'] {
  if (lever === null || lever.whPerDay === 0) return null;
  return (energy: PeriodEnergy, period: Period) => {
    const first = latestDay(period.from, lever.from);
    const days = Math.max(0, daysBetween(first, period.to));
    if (days === 0) return energy;
    const { productionWh, exportWh, useWh } = energy;
    const sentInHours = exportWh * shareInHours(hourly, period.from, lever.fromHour, lever.toHour);
    const inDays = (sentInHours * days) / daysBetween(period.from, period.to);
    const more = lever.whPerDay * days;
    const met = Math.floor(Math.min(more, inDays));
    const changed = energyFrom(productionWh, useWh + more, exportWh - met);
    const selfWh = energy.exportWh - changed.exportWh;
    return { ...changed, atHours: { importWh: more - selfWh, selfWh, fromHour: lever.fromHour, toHour: lever.toHour } };
  };
}

function moreUseWords(whPerDay: NonNullable<Levers['moreUse']>['whPerDay'], hourly: HourlyExport): string {
  const from =
    hourly.from === 'intervals'
      ? 'by the hours in which the house sends out on a mean day of each month'
      : 'by an assumed shape of the day, since there are no export readings by the hour';
  return `Of the ${sayKwh(whPerDay)} kWh a day the roof meets what it would have sent out in those hours, ${from}: an estimate.`;
}
