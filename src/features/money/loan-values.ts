import type { DayCount, LoanFacts, LoanSecurity } from '#shared/facts/finance.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import { fractionOfPercent, percentOfFraction } from '#src/lib/typed-values.ts';
import type { ContractBody, LoanBalanceBody, LoanPaymentBody, RefinanceBody } from './loan-queries.ts';

const NO_DATE = 'Write a date that exists.';
const NO_AMOUNT = 'Write an amount such as 244.93.';
const NO_RATE = 'Write a percent from 0 to 100, such as 5.49.';
const SOME_DAY = '1970-01-01' as Day;

export type PaymentValues = {
  on: string;
  amountCents: string;
  extraPrincipalCents: string;
  reamortize: boolean;
  note: string;
  documentId: string;
};

export function readPayment(values: PaymentValues): Reading<LoanPaymentBody> {
  const list = new FaultList();
  const amountCents = list.needed(values.amountCents, aboveZero, 'amountCents', NO_AMOUNT, cents(1));
  const extra = list.optional(values.extraPrincipalCents, fromZero, 'extraPrincipalCents', NO_AMOUNT) ?? cents(0);
  if (extra > amountCents) {
    list.add('extraPrincipalCents', 'The extra principal is a part of the payment and cannot be more than it.');
  }
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    amountCents,
    extraPrincipalCents: extra,
    note: values.note.trim() === '' ? null : values.note.trim(),
    reamortize: values.reamortize,
    documentId: paperOf(values.documentId),
  });
}

/** The promotion's and the prepayment's fields stand under the names the server answers by. */
export type ContractValues = {
  dayCount: DayCount;
  promotion: { payment: 'no' | 'level' | 'interest' | 'none'; months: string; annualRate: string };
  assumedPrepayment: { is: 'no' | 'yes'; amountCents: string; byPayment: string };
  payoffFeeCents: string;
  security: LoanSecurity;
};

export function contractValues(facts: LoanFacts): ContractValues {
  const { promotion, assumedPrepayment } = facts;
  return {
    dayCount: facts.dayCount,
    promotion: {
      payment: promotion?.payment ?? 'no',
      months: promotion === null ? '' : String(promotion.months),
      annualRate: promotion === null ? '' : percentOfFraction(promotion.annualRate),
    },
    assumedPrepayment: {
      is: assumedPrepayment === null ? 'no' : 'yes',
      amountCents: assumedPrepayment === null ? '' : dollarsText(assumedPrepayment.amountCents),
      byPayment: assumedPrepayment === null ? '18' : String(assumedPrepayment.byPayment),
    },
    payoffFeeCents: facts.payoffFeeCents === 0 ? '' : dollarsText(facts.payoffFeeCents),
    security: facts.security,
  };
}

export function readContract(values: ContractValues): Reading<ContractBody> {
  const list = new FaultList();
  const { promotion, assumedPrepayment: assumed } = values;
  const months = wholeFrom(1, 60);
  return list.reading({
    dayCount: values.dayCount,
    promotion:
      promotion.payment === 'no'
        ? null
        : {
            payment: promotion.payment,
            months: list.needed(promotion.months, months, 'promotion.months', 'Write a number from 1 to 60.', 1),
            annualRate: list.needed(promotion.annualRate, rateFromZero, 'promotion.annualRate', NO_RATE, '0'),
          },
    assumedPrepayment:
      assumed.is === 'no'
        ? null
        : {
            amountCents: list.needed(
              assumed.amountCents,
              aboveZero,
              'assumedPrepayment.amountCents',
              NO_AMOUNT,
              cents(1),
            ),
            byPayment: list.needed(
              assumed.byPayment,
              months,
              'assumedPrepayment.byPayment',
              'Write a number from 1 to 60.',
              1,
            ),
          },
    payoffFeeCents: list.optional(values.payoffFeeCents, fromZero, 'payoffFeeCents', NO_AMOUNT) ?? cents(0),
    security: values.security,
  });
}

export type LoanBalanceValues = { on: string; balanceCents: string; documentId: string };

export function readLoanBalance(values: LoanBalanceValues): Reading<LoanBalanceBody> {
  const list = new FaultList();
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    balanceCents: list.needed(values.balanceCents, fromZero, 'balanceCents', NO_AMOUNT, cents(0)),
    documentId: paperOf(values.documentId),
  });
}

export type RefinanceValues = {
  on: string;
  lender: string;
  principalCents: string;
  annualRate: string;
  termMonths: string;
  firstPaymentOn: string;
  costsCents: string;
  documentId: string;
};

export function readRefinance(values: RefinanceValues): Reading<RefinanceBody> {
  const list = new FaultList();
  const on = list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY);
  const firstPaymentOn = list.needed(values.firstPaymentOn, parseDay, 'firstPaymentOn', NO_DATE, SOME_DAY);
  if (list.faults.length === 0 && firstPaymentOn <= on) {
    list.add('firstPaymentOn', 'The first payment must come after the refinance.');
  }
  const term = wholeFrom(1, 480);
  return list.reading({
    on,
    lender: values.lender.trim(),
    principalCents: list.needed(values.principalCents, aboveZero, 'principalCents', NO_AMOUNT, cents(1)),
    annualRate: list.needed(values.annualRate, rateFromZero, 'annualRate', NO_RATE, '0'),
    termMonths: list.needed(values.termMonths, term, 'termMonths', 'Write a number from 1 to 480.', 1),
    firstPaymentOn,
    costsCents: list.optional(values.costsCents, fromZero, 'costsCents', NO_AMOUNT) ?? cents(0),
    documentId: paperOf(values.documentId),
  });
}

function aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

function fromZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}

function rateFromZero(text: string): string | null {
  const fraction = fractionOfPercent(text);
  return fraction !== null && Number(fraction) >= 0 && Number(fraction) <= 1 ? fraction : null;
}

function wholeFrom(least: number, most: number) {
  return (text: string): number | null => {
    const value = /^\d{1,3}$/.test(text.trim()) ? Number(text) : null;
    return value !== null && value >= least && value <= most ? value : null;
  };
}

function paperOf(id: string): string | null {
  return id === '' ? null : id;
}
