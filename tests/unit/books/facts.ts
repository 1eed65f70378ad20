import {
  type CreditCost,
  type CreditFacts,
  type IncentiveFacts,
  type LoanFacts,
  type LoanPayment,
  loanMore,
  type MortgageFacts,
  mortgageMore,
} from '#shared/facts/finance.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';

/** A loan of $30,000 at 6.99 % over 240 months, the first payment on 15 July 2024: level payment $232.41. */
export function loanOf(changes: Partial<LoanFacts> = {}): LoanFacts {
  return {
    lender: 'Calder Savings',
    principalCents: cents(3_000_000),
    dealerFeeCents: cents(240_000),
    annualRate: '0.0699',
    termMonths: 240,
    fundedOn: day('2024-06-15'),
    firstPaymentOn: day('2024-07-15'),
    ...loanMore.parse({}),
    payments: [],
    ...changes,
  };
}

export function paymentOf(on: string, dollars: number, extraDollars = 0): LoanPayment {
  return {
    id: `paid-${on}-${extraDollars}`,
    on: day(on),
    amountCents: cents(Math.round(dollars * 100)),
    extraPrincipalCents: cents(Math.round(extraDollars * 100)),
    note: null,
    reamortize: false,
    documentId: null,
  };
}

/** $342,000 at 6.75 % on a value of $360,000, first payment 1 June 2024: 80 % with payment 127, 78 % with payment 139. */
export function mortgageOf(
  changes: Partial<MortgageFacts> = {},
  insurance: Partial<NonNullable<MortgageFacts['insurance']>> = {},
): MortgageFacts {
  return {
    lender: 'Harbour Mortgage',
    kind: 'conventional',
    principalCents: cents(34_200_000),
    annualRate: '0.0675',
    termMonths: 360,
    firstPaymentOn: day('2024-06-01'),
    originalValueCents: cents(36_000_000),
    extraPrincipalMonthlyCents: cents(0),
    endedOn: null,
    insurance: {
      premiumMonthlyCents: cents(14_250),
      removedOn: day('2025-09-01'),
      becauseOfRoof: true,
      endRule: 'prudent',
      appreciationOn: null,
      ...insurance,
    },
    ...mortgageMore.parse({}),
    ...changes,
  };
}

/** $36,900 placed in service in 2024 at 30 %: $11,070 over three returns. */
export function creditOf(changes: Partial<CreditFacts> = {}): CreditFacts {
  return {
    placedInServiceOn: day('2024-05-22'),
    costs: [
      creditCost('Contract', 3_640_000, 'qualified'),
      creditCost('Permit', 50_000, 'qualified'),
      creditCost('Dealer fee', 310_000, 'leftOut', 'Part of the loan'),
    ],
    homeShare: '1',
    carriedIn: null,
    years: [
      creditYear(2024, 415_000, {
        status: 'filed',
        filedOn: day('2025-03-10'),
        refundOn: day('2025-03-28'),
        asRefund: true,
      }),
      creditYear(2025, 505_000, { status: 'filed', filedOn: day('2026-03-02') }),
      creditYear(2026, 520_000, {}),
    ],
    ...changes,
  };
}

export function creditCost(
  label: string,
  amountCents: number,
  treatment: CreditCost['treatment'],
  reason: string | null = null,
): CreditCost {
  return {
    id: label.toLowerCase().replaceAll(' ', '-'),
    label,
    amountCents: cents(amountCents),
    treatment,
    reason,
    placedInServiceOn: null,
    documentId: null,
  };
}

export function creditYear(
  taxYear: number,
  limitCents: number | null,
  changes: Partial<CreditFacts['years'][number]>,
): CreditFacts['years'][number] {
  return {
    taxYear,
    limitCents: limitCents === null ? null : cents(limitCents),
    status: 'planned',
    filedOn: null,
    refundOn: null,
    asRefund: false,
    typedBy: 'Priya',
    limitFrom: null,
    documentId: null,
    ...changes,
  };
}

export function incentiveOf(changes: Partial<IncentiveFacts> = {}): IncentiveFacts {
  return {
    payer: 'State programme',
    ratePerKwh: '0.0450',
    firstDay: day('2025-01-10'),
    lastDay: day('2033-01-09'),
    paidAs: 'separate',
    received: [],
    ...changes,
  };
}
