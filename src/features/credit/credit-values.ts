import type { CreditCost, CreditFacts, CreditYear } from '#shared/facts/finance.ts';
import { type Cents, cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { FaultList, type Reading } from '#src/lib/form.ts';
import type { CarriedInBody, CreditCostBody, CreditYearBody } from './credit-queries.ts';

const NO_DATE = 'Write a date that exists.';
const NO_YEAR = 'Write a year such as 2026.';

export type YearValues = {
  taxYear: string;
  limitCents: string;
  limitFrom: string;
  status: CreditYear['status'];
  filedOn: string;
  refundOn: string;
  asRefund: 'refund' | 'lessTax';
  documentId: string;
};

export function yearValues(year: CreditYear | null, suggested: number): YearValues {
  return {
    taxYear: String(year?.taxYear ?? suggested),
    limitCents: year === null || year.limitCents === null ? '' : dollarsText(year.limitCents),
    limitFrom: year?.limitFrom ?? '',
    status: year?.status ?? 'planned',
    filedOn: year?.filedOn ?? '',
    refundOn: year?.refundOn ?? '',
    asRefund: year === null || year.asRefund ? 'refund' : 'lessTax',
    documentId: year?.documentId ?? '',
  };
}

export function readYear(values: YearValues): Reading<{ taxYear: number; body: CreditYearBody }> {
  const list = new FaultList();
  const taxYear = list.needed(values.taxYear, taxYearOf, 'taxYear', NO_YEAR, 0);
  const filed = values.status !== 'planned';
  const asRefund = values.asRefund === 'refund';
  const body: CreditYearBody = {
    limitCents: list.optional(values.limitCents, zeroOrMore, 'limitCents', 'Write an amount such as 4150.'),
    limitFrom: textOrNull(values.limitFrom),
    status: values.status,
    filedOn: filed ? list.needed(values.filedOn, parseDay, 'filedOn', NO_DATE, '1970-01-01' as Day) : null,
    refundOn: filed && asRefund ? list.optional(values.refundOn, parseDay, 'refundOn', NO_DATE) : null,
    asRefund,
    documentId: textOrNull(values.documentId),
  };
  if (filed && values.limitCents.trim() === '') {
    list.add('limitCents', 'A filed return has a line 14; write it here.');
  }
  return list.reading({ taxYear, body });
}

export type CarriedInValues = { has: 'no' | 'yes'; taxYear: string; amountCents: string };

export function carriedInValues({ carriedIn }: CreditFacts): CarriedInValues {
  return {
    has: carriedIn === null ? 'no' : 'yes',
    taxYear: carriedIn === null ? '' : String(carriedIn.taxYear),
    amountCents: carriedIn === null ? '' : dollarsText(carriedIn.amountCents),
  };
}

export function readCarriedIn(values: CarriedInValues): Reading<CarriedInBody> {
  const list = new FaultList();
  if (values.has === 'no') return list.reading({ carriedIn: null });
  return list.reading({
    carriedIn: {
      taxYear: list.needed(values.taxYear, taxYearOf, 'taxYear', NO_YEAR, 0),
      amountCents: list.needed(
        values.amountCents,
        zeroOrMore,
        'amountCents',
        'Write an amount such as 4150.',
        cents(0),
      ),
    },
  });
}

export type CostValues = { placedInServiceOn: string; documentId: string };

export function costValues(cost: CreditCost): CostValues {
  return { placedInServiceOn: cost.placedInServiceOn ?? '', documentId: cost.documentId ?? '' };
}

export function readCost(values: CostValues): Reading<CreditCostBody> {
  const list = new FaultList();
  return list.reading({
    placedInServiceOn: list.optional(values.placedInServiceOn, parseDay, 'placedInServiceOn', NO_DATE),
    documentId: textOrNull(values.documentId),
  });
}

function taxYearOf(text: string): number | null {
  const year = /^\d{4}$/.test(text.trim()) ? Number(text.trim()) : 0;
  return year >= 2006 && year <= 2100 ? year : null;
}

function zeroOrMore(text: string): Cents | null {
  const amount = parseDollars(text);
  return amount !== null && amount >= 0 ? amount : null;
}

function textOrNull(text: string): string | null {
  return text.trim() === '' ? null : text.trim();
}
