import type { LeaseBody, OtherLoanBody } from '#shared/api/money-other.ts';
import type { LeaseFacts, LoanFacts, OtherLoan } from '#shared/facts/finance.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import { fractionOfPercent, percentOfFraction, plainDecimal } from '#src/lib/typed-values.ts';
import type { PaymentBody } from './other-queries.ts';

const NO_DATE = 'Write a date that exists.';
const NO_AMOUNT = 'Write an amount such as 12,400.';
const NO_TERM = 'Write whole months from 1 to 480.';
const SOME_DAY = '1970-01-01' as Day;

export const OTHER_KINDS: Record<OtherLoan['kind'], string> = {
  mortgageShare: 'a share of the mortgage or a refinance',
  homeEquity: 'a home-equity loan or line',
  other: 'another loan',
};

export type OtherLoanValues = {
  kind: OtherLoan['kind'];
  lender: string;
  principalCents: string;
  dealerFeeCents: string;
  annualRate: string;
  termMonths: string;
  fundedOn: string;
  firstPaymentOn: string;
  documentId: string;
};

export function otherLoanValues(given: { kind: OtherLoan['kind']; facts: LoanFacts } | null): OtherLoanValues {
  const loan = given?.facts;
  return {
    kind: given?.kind ?? 'mortgageShare',
    lender: loan?.lender ?? '',
    principalCents: loan === undefined ? '' : dollarsText(loan.principalCents),
    dealerFeeCents: loan === undefined || loan.dealerFeeCents === 0 ? '' : dollarsText(loan.dealerFeeCents),
    annualRate: loan === undefined ? '' : percentOfFraction(loan.annualRate),
    termMonths: loan === undefined ? '' : String(loan.termMonths),
    fundedOn: loan?.fundedOn ?? '',
    firstPaymentOn: loan?.firstPaymentOn ?? '',
    documentId: loan?.documentId ?? '',
  };
}

export function readOtherLoan(values: OtherLoanValues): Reading<OtherLoanBody> {
  const list = new FaultList();
  const principalCents = list.needed(values.principalCents, aboveZero, 'principalCents', NO_AMOUNT, cents(1));
  const dealerFeeCents = list.optional(values.dealerFeeCents, zeroOrMore, 'dealerFeeCents', NO_AMOUNT) ?? cents(0);
  if (dealerFeeCents > principalCents) {
    list.add('dealerFeeCents', 'The dealer fee is inside the principal and cannot be more than it.');
  }
  const fundedOn = list.needed(values.fundedOn, parseDay, 'fundedOn', NO_DATE, SOME_DAY);
  const firstPaymentOn = list.needed(values.firstPaymentOn, parseDay, 'firstPaymentOn', NO_DATE, fundedOn);
  if (firstPaymentOn < fundedOn) list.add('firstPaymentOn', 'The first payment cannot come before the funding.');
  return list.reading({
    kind: values.kind,
    lender: values.lender.trim(),
    principalCents,
    dealerFeeCents,
    annualRate: list.needed(values.annualRate, rateOf, 'annualRate', 'Write a percent such as 6.99.', '0'),
    termMonths: list.needed(values.termMonths, monthsOf, 'termMonths', NO_TERM, 1),
    fundedOn,
    firstPaymentOn,
    documentId: paperOf(values.documentId),
  });
}

export type LeaseValues = {
  kind: LeaseFacts['kind'];
  company: string;
  firstPaymentOn: string;
  termMonths: string;
  monthlyCents: string;
  ratePerKwh: string;
  yearlyRise: string;
  documentId: string;
};

export function leaseValues(lease: LeaseFacts | null): LeaseValues {
  return {
    kind: lease?.kind ?? 'lease',
    company: lease?.company ?? '',
    firstPaymentOn: lease?.firstPaymentOn ?? '',
    termMonths: lease === null ? '' : String(lease.termMonths),
    monthlyCents: lease === null || lease.kind !== 'lease' ? '' : dollarsText(lease.monthlyCents),
    ratePerKwh: lease?.ratePerKwh ?? '',
    yearlyRise: lease === null ? '' : percentOfFraction(lease.yearlyRise),
    documentId: lease?.documentId ?? '',
  };
}

export function readLease(values: LeaseValues): Reading<LeaseBody> {
  const list = new FaultList();
  const monthly = values.kind === 'lease';
  return list.reading({
    kind: values.kind,
    company: values.company.trim(),
    firstPaymentOn: list.needed(values.firstPaymentOn, parseDay, 'firstPaymentOn', NO_DATE, SOME_DAY),
    termMonths: list.needed(values.termMonths, monthsOf, 'termMonths', NO_TERM, 1),
    monthlyCents: monthly
      ? list.needed(values.monthlyCents, aboveZero, 'monthlyCents', 'Write an amount such as 98.50.', cents(1))
      : cents(0),
    ratePerKwh: monthly
      ? null
      : list.needed(values.ratePerKwh, priceOf, 'ratePerKwh', 'Write a price per kWh such as 0.1195.', '0'),
    yearlyRise:
      list.optional(values.yearlyRise, fractionOfPercent, 'yearlyRise', 'Write a percent such as 2.9.') ?? '0',
    documentId: paperOf(values.documentId),
  });
}

export type PaymentValues = {
  on: string;
  amountCents: string;
  extraPrincipalCents: string;
  note: string;
  documentId: string;
};

export function readPayment(values: PaymentValues): Reading<PaymentBody> {
  const list = new FaultList();
  const amountCents = list.needed(values.amountCents, aboveZero, 'amountCents', NO_AMOUNT, cents(1));
  const extra = list.optional(values.extraPrincipalCents, zeroOrMore, 'extraPrincipalCents', NO_AMOUNT) ?? cents(0);
  if (extra > amountCents) {
    list.add('extraPrincipalCents', 'The extra principal is a part of the payment and cannot be more than it.');
  }
  return list.reading({
    on: list.needed(values.on, parseDay, 'on', NO_DATE, SOME_DAY),
    amountCents,
    extraPrincipalCents: extra,
    note: values.note.trim() === '' ? null : values.note.trim(),
    reamortize: false,
    documentId: paperOf(values.documentId),
  });
}

function paperOf(text: string): string | null {
  return text === '' ? null : text;
}

function aboveZero(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount > 0 ? amount : null;
}

function zeroOrMore(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}

function monthsOf(text: string): number | null {
  const months = Number(text.trim());
  return /^\d{1,3}$/.test(text.trim()) && months >= 1 && months <= 480 ? months : null;
}

function rateOf(text: string): string | null {
  const fraction = fractionOfPercent(text);
  return fraction === null || fraction.startsWith('-') ? null : fraction;
}

function priceOf(text: string): string | null {
  const price = plainDecimal(text);
  return price === null || price.startsWith('-') ? null : price;
}
