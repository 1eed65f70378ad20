import { type RatePlan, type RatePlanInput, type RateRow, ratePlanSchema } from '#shared/settlement/plan.ts';
import type { Day } from '#shared/units/day.ts';
import { fractionOfPercent, plainDecimal } from '#src/lib/typed-values.ts';

/** What happens to energy sent out: each kWh earns a price, only what is left after netting does, kWh are carried, or nothing. */
export type ExportRule = 'priced' | 'pricedAfterNetting' | 'carried' | 'nothing';

/** One column of prices by date. In the first row every price that applies is filled in; a blank later on means "as before". */
export type PriceRow = {
  from: string;
  energy: string;
  exported: string;
  customer: string;
  gross: string;
  taxPercent: string;
};
export type PriceName = Exclude<keyof PriceRow, 'from'>;

export type ChargeName = 'energy' | 'customer' | 'gross' | 'tax';
type PartName = ChargeName | 'credit' | 'bank';

/** A rate plan as a few plain questions. Prices and percents are text as typed; the rest are choices. */
export type PlanForm = {
  name: string;
  exportRule: ExportRule;
  prices: PriceRow[];
  customerPer: 'cycle' | 'day';
  hasCustomer: boolean;
  hasGross: boolean;
  hasTax: boolean;
  taxOnEnergy: boolean;
  taxOnCustomer: boolean;
  taxOnGross: boolean;
  taxAfterCredits: boolean;
  spendOn: 'energy' | 'all';
  spendWhen: 'same' | 'next';
  lapse: 'never' | 'expire' | 'pay';
  /** 1–12, as text: the month in whose cycle unused credit lapses or is paid. */
  lapseMonth: string;
  payTo: 'bill' | 'separate';
  /** Price paid for each leftover kWh; used where kWh are carried and paid. */
  payRate: string;
  priceChange: 'days' | 'readDate';
  /** Names as printed and ids in the plan, kept so that papers matched to them stay matched. */
  labels: Record<PartName, string>;
  ids: Record<PartName, string>;
  order: ChargeName[];
};

export const LABELS: PlanForm['labels'] = {
  energy: 'Energy',
  customer: 'Customer charge',
  gross: 'Public benefits',
  tax: 'Tax',
  credit: 'Export credit',
  bank: 'Credit bank',
};
export const IDS: PlanForm['ids'] = {
  energy: 'energy',
  customer: 'customer',
  gross: 'gross',
  tax: 'tax',
  credit: 'exportCredit',
  bank: 'creditBank',
};

export function emptyPlanForm(from: string): PlanForm {
  return {
    name: '',
    exportRule: 'priced',
    prices: [{ from, energy: '', exported: '', customer: '', gross: '', taxPercent: '' }],
    customerPer: 'cycle',
    hasCustomer: true,
    hasGross: false,
    hasTax: false,
    taxOnEnergy: true,
    taxOnCustomer: true,
    taxOnGross: true,
    taxAfterCredits: true,
    spendOn: 'energy',
    spendWhen: 'same',
    lapse: 'never',
    lapseMonth: '4',
    payTo: 'separate',
    payRate: '',
    priceChange: 'days',
    labels: { ...LABELS },
    ids: { ...IDS },
    order: ['energy', 'customer', 'gross', 'tax'],
  };
}

/** The prices the answers ask for, in the order of the table. */
export function pricesAsked(form: PlanForm): PriceName[] {
  const asked: PriceName[] = ['energy'];
  if (form.exportRule === 'priced' || form.exportRule === 'pricedAfterNetting') asked.push('exported');
  if (form.hasCustomer) asked.push('customer');
  if (form.hasGross) asked.push('gross');
  if (form.hasTax) asked.push('taxPercent');
  return asked;
}

/** The plan a filled-in form says. Trusts that its prices have been checked; a blank price in a later row makes no row. */
export function planOf(form: PlanForm, timeZone: string): RatePlan {
  const { ids, labels } = form;
  const netting = form.exportRule === 'pricedAfterNetting' || form.exportRule === 'carried' ? 'cycle' : 'none';
  const charges = chargesOf(form);
  const paysTax = form.hasTax && !form.taxAfterCredits;
  const offsets =
    form.spendOn === 'energy'
      ? [ids.energy]
      : charges.filter((charge) => charge.basis !== 'percent' || paysTax).map((charge) => charge.id);
  const carried = form.exportRule === 'carried';
  const priced = form.exportRule === 'priced' || form.exportRule === 'pricedAfterNetting';
  const plan: RatePlanInput = {
    name: form.name.trim(),
    timeZone,
    netting,
    rateChangeBy: form.priceChange,
    charges,
    credits: priced
      ? [
          {
            id: ids.credit,
            label: labels.credit,
            kind: 'export',
            basis: 'export',
            rates: rowsOf(form, 'exported'),
            to: ids.bank,
          },
        ]
      : [],
    banks:
      priced || carried
        ? [
            {
              id: ids.bank,
              label: labels.bank,
              unit: carried ? 'kWh' : 'USD',
              sameCycle: form.spendWhen === 'same',
              offsets: carried ? [ids.energy] : offsets,
              trueUps: trueUpsOf(form, carried),
            },
          ]
        : [],
  };
  return ratePlanSchema.parse(plan);
}

function chargesOf(form: PlanForm): RatePlanInput['charges'] {
  const { ids, labels } = form;
  const on = [
    ...(form.taxOnEnergy ? (['energy'] as const) : []),
    ...(form.taxOnCustomer && form.hasCustomer ? (['customer'] as const) : []),
    ...(form.taxOnGross && form.hasGross ? (['gross'] as const) : []),
  ];
  const all: Record<ChargeName, RatePlanInput['charges'][number] | null> = {
    energy: { id: ids.energy, label: labels.energy, kind: 'import', basis: 'import', rates: rowsOf(form, 'energy') },
    customer: form.hasCustomer
      ? {
          id: ids.customer,
          label: labels.customer,
          kind: 'fixed',
          basis: form.customerPer,
          rates: rowsOf(form, 'customer'),
        }
      : null,
    gross: form.hasGross
      ? {
          id: ids.gross,
          label: labels.gross,
          kind: 'nonbypassable',
          basis: 'import',
          netting: 'none',
          rates: rowsOf(form, 'gross'),
        }
      : null,
    tax: form.hasTax
      ? {
          id: ids.tax,
          label: labels.tax,
          kind: 'tax',
          basis: 'percent',
          on: form.order.filter((name) => on.some((one) => one === name)).map((name) => ids[name]),
          afterCredits: form.taxAfterCredits,
          rates: rowsOf(form, 'taxPercent'),
        }
      : null,
  };
  return form.order.flatMap((name) => all[name] ?? []);
}

function rowsOf(form: PlanForm, name: PriceName): RateRow[] {
  return form.prices.flatMap((row) => {
    const rate = name === 'taxPercent' ? fractionOfPercent(row[name]) : plainDecimal(row[name]);
    return rate === null ? [] : [{ from: row.from as Day, rate }];
  });
}

function trueUpsOf(
  form: PlanForm,
  carried: boolean,
): NonNullable<NonNullable<RatePlanInput['banks']>[number]['trueUps']> {
  const at = { months: [Number(form.lapseMonth)] };
  switch (form.lapse) {
    case 'never':
      return [];
    case 'expire':
      return [{ at, action: 'expire' }];
    case 'pay': {
      const from = (form.prices[0]?.from ?? '') as Day;
      const rates = carried ? [{ from, rate: plainDecimal(form.payRate) ?? '0' }] : null;
      return [{ at, action: 'pay', to: form.payTo, rates }];
    }
  }
}
