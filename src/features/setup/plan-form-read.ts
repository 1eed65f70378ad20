import type { RatePlan, RateRow } from '#shared/settlement/plan.ts';
import { percentOfFraction } from '#src/lib/typed-values.ts';
import {
  type ChargeName,
  emptyPlanForm,
  IDS,
  LABELS,
  type PlanForm,
  type PriceName,
  type PriceRow,
  planOf,
} from './plan-form.ts';

/**
 * The form that says exactly this plan, or null when plain questions cannot. Whatever is read is built again and compared, so that a plan is
 * never changed by being looked at.
 */
export function planFormOf(plan: RatePlan): PlanForm | null {
  const read = readPlan(plan);
  return read !== null && samePlan(planOf(read, plan.timeZone), plan) ? read : null;
}

function readPlan(plan: RatePlan): PlanForm | null {
  const energy = plan.charges.find((charge) => charge.kind === 'import');
  const gross = plan.charges.find((charge) => charge.kind === 'nonbypassable');
  const customer = plan.charges.find((charge) => charge.kind === 'fixed');
  const tax = plan.charges.find((charge) => charge.kind === 'tax');
  const credit = plan.credits[0];
  const bank = plan.banks[0];
  const first = energy?.rates[0]?.from;
  if (!energy || !first) return null;
  const named = { energy, customer, gross, tax };
  const nameOf = (id: string) => (Object.keys(named) as ChargeName[]).find((name) => named[name]?.id === id);
  const order = plan.charges.flatMap((charge) => nameOf(charge.id) ?? []);
  const trueUp = bank?.trueUps[0];
  const month = trueUp && typeof trueUp.at === 'object' && 'months' in trueUp.at ? trueUp.at.months[0] : undefined;
  const empty = emptyPlanForm(first);
  return {
    ...empty,
    name: plan.name,
    exportRule: credit ? (plan.netting === 'cycle' ? 'pricedAfterNetting' : 'priced') : bank ? 'carried' : 'nothing',
    prices: pricesOf({
      energy: energy.rates,
      exported: credit?.rates ?? [],
      customer: customer?.rates ?? [],
      gross: gross?.rates ?? [],
      taxPercent: tax?.rates ?? [],
    }),
    customerPer: customer?.basis === 'day' ? 'day' : 'cycle',
    hasCustomer: customer !== undefined,
    hasGross: gross !== undefined,
    hasTax: tax !== undefined,
    taxOnEnergy: tax?.on.includes(energy.id) ?? true,
    taxOnCustomer: tax && customer ? tax.on.includes(customer.id) : true,
    taxOnGross: tax && gross ? tax.on.includes(gross.id) : true,
    taxAfterCredits: tax?.afterCredits ?? true,
    spendOn: (bank?.offsets.length ?? 0) > 1 ? 'all' : 'energy',
    spendWhen: bank && !bank.sameCycle ? 'next' : 'same',
    lapse: trueUp ? (trueUp.action === 'pay' ? 'pay' : 'expire') : 'never',
    lapseMonth: String(month ?? empty.lapseMonth),
    payTo: trueUp?.to ?? 'separate',
    payRate: trueUp?.rates?.[0]?.rate ?? '',
    priceChange: plan.rateChangeBy === 'readDate' ? 'readDate' : 'days',
    labels: {
      energy: energy.label,
      customer: customer?.label ?? LABELS.customer,
      gross: gross?.label ?? LABELS.gross,
      tax: tax?.label ?? LABELS.tax,
      credit: credit?.label ?? LABELS.credit,
      bank: bank?.label ?? LABELS.bank,
    },
    ids: {
      energy: energy.id,
      customer: customer?.id ?? IDS.customer,
      gross: gross?.id ?? IDS.gross,
      tax: tax?.id ?? IDS.tax,
      credit: credit?.id ?? IDS.credit,
      bank: bank?.id ?? IDS.bank,
    },
    order: [...order, ...empty.order.filter((name) => !order.includes(name))],
  };
}

/** Price columns laid side by side by date: one row for each day on which any of them changes. */
function pricesOf(columns: Record<PriceName, RateRow[]>): PriceRow[] {
  const days = [...new Set(Object.values(columns).flatMap((rows) => rows.map((row) => row.from)))].sort();
  return days.map((from) => {
    const at = (name: PriceName) => columns[name].find((row) => row.from === from)?.rate ?? '';
    return {
      from,
      energy: at('energy'),
      exported: at('exported'),
      customer: at('customer'),
      gross: at('gross'),
      taxPercent: at('taxPercent') === '' ? '' : percentOfFraction(at('taxPercent')),
    };
  });
}

/** True where two plans say the same, whatever way they spell a number or leave a default out. */
export function samePlan(one: RatePlan, other: RatePlan): boolean {
  return JSON.stringify(plainPlan(one)) === JSON.stringify(plainPlan(other));
}

function plainPlan(plan: RatePlan): unknown {
  const own = <T extends { netting: RatePlan['netting'] | null }>(part: T) => ({
    ...part,
    netting: part.netting ?? plan.netting,
  });
  // With no season, no rule depends on how a change of season is decided.
  const seasonBy = plan.calendar.seasons.length === 0 ? 'readDate' : plan.seasonBy;
  return sorted({
    ...plan,
    seasonBy,
    charges: plan.charges.map(own),
    credits: plan.credits.map(own),
    banks: plan.banks.map(own),
  });
}

const RATE_TEXT = /^-?\d+(\.\d+)?$/;

/** Keys in one order and numbers in one spelling. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value === 'string' && RATE_TEXT.test(value))
    return value.includes('.') ? value.replace(/\.?0+$/, '') : value;
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .filter(([, inner]) => inner !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, inner]) => [key, sorted(inner)]),
  );
}
