import { type RatePlan, type RateRow, type RatesOf, ratePlanSchema } from '#shared/settlement/plan.ts';
import { percentOfFraction } from '#src/lib/typed-values.ts';
import { newTrueUp } from './new-parts.ts';
import type { PlanForm, PricedBy, PriceRow, ShareForm, TrueUpForm } from './plan-form.ts';
import { planInput } from './plan-of.ts';
import { cellKey, trueUpKey } from './price-cells.ts';
import { samePlan } from './same-plan.ts';
import { seasonName } from './season-ids.ts';

/**
 * The form that says exactly this plan, or null when it cannot. Whatever is read is built again and compared, so that a plan is never changed
 * by being looked at.
 */
export function planFormOf(plan: RatePlan): PlanForm | null {
  const read = readForm(plan);
  const again = ratePlanSchema.safeParse(planInput(read, plan.timeZone));
  return again.success && samePlan(again.data, plan) ? read : null;
}

function readForm(plan: RatePlan): PlanForm {
  const prices = new Prices();
  const charges = plan.charges.map((charge) => {
    const percent = charge.basis === 'percent';
    prices.add(charge.id, charge.rates, percent);
    return {
      ...pricedBy(charge.rates),
      id: charge.id,
      label: charge.label,
      kind: charge.kind,
      basis: charge.basis,
      netting: charge.netting ?? ('' as const),
      kWOf: charge.kWOf ?? ('' as const),
      on: [...charge.on],
      per: charge.per ?? ('' as const),
      afterCredits: charge.afterCredits,
      solarOnly: charge.solarOnly,
      learned: charge.learned,
      tiers: charge.tiers.map((row) => ({
        from: row.from,
        season: row.season ?? '',
        per: row.per,
        limits: row.limits.join('; '),
      })),
    };
  });
  const credits = plan.credits.map((credit) => {
    prices.add(credit.id, credit.rates ?? []);
    return {
      ...pricedBy(credit.rates ?? []),
      ...shareForm(credit.ratesOf),
      id: credit.id,
      label: credit.label,
      kind: credit.kind,
      basis: credit.basis,
      netting: credit.netting ?? ('' as const),
      priced: credit.ratesOf ? ('share' as const) : ('own' as const),
      termFrom: credit.term?.firstDay ?? '',
      termTo: credit.term?.lastDay ?? '',
      capAmount: credit.cap?.amount ?? '',
      capPer: credit.cap?.per ?? ('year' as const),
      to: credit.to,
    };
  });
  const banks = plan.banks.map((bank) => ({
    id: bank.id,
    label: bank.label,
    unit: bank.unit,
    netting: bank.netting ?? ('' as const),
    byPeriod: bank.byPeriod,
    ifPeriodAbsent: bank.ifPeriodAbsent,
    ratio: bank.ratio,
    sameCycle: bank.sameCycle,
    offsets: [...bank.offsets],
    keepMinimum: bank.keepMinimum ?? '',
    belowZero: bank.belowZero,
    lotCycles: bank.lotLife ? String(bank.lotLife.cycles) : '',
    trueUps: bank.trueUps.map((trueUp, index) => {
      prices.add(trueUpKey(bank.id, index), trueUp.rates ?? []);
      return trueUpForm(trueUp);
    }),
  }));
  return {
    name: plan.name,
    seasons: plan.calendar.seasons.map(({ id, from, to }) => ({ id, name: seasonName(id), from, to })),
    periods: plan.calendar.periods.map(({ id, label, when }) => ({
      id,
      label,
      rest: when === 'rest',
      hours: when === 'rest' ? [] : when.map((span) => ({ ...span, season: span.season ?? '' })),
    })),
    holidays: plan.calendar.holidays?.dates.join('\n') ?? '',
    holidaysAs: plan.calendar.holidays?.as ?? 'weekend',
    charges,
    netting: plan.netting,
    credits,
    banks,
    prices: prices.rows(),
    load: plan.load,
    rateChangeBy: plan.rateChangeBy,
    seasonBy: plan.seasonBy,
    rounding: plan.rounding,
  };
}

function pricedBy(rates: readonly RateRow[]): PricedBy {
  return {
    bySeason: rates.some((row) => row.season !== undefined),
    byPeriod: rates.some((row) => row.period !== undefined),
  };
}

function shareForm(share: RatesOf | null): ShareForm {
  return {
    shareOf: [...(share?.charges ?? [])],
    sharePercent: percentOfFraction(share?.fraction ?? '1'),
    shareTier: String(share?.tier ?? 1),
  };
}

function trueUpForm(trueUp: RatePlan['banks'][number]['trueUps'][number]): TrueUpForm {
  const { at, keep } = trueUp;
  const empty = newTrueUp();
  return {
    ...pricedBy(trueUp.rates ?? []),
    ...shareForm(trueUp.ratesOf),
    at: typeof at === 'string' ? at : 'months' in at ? 'months' : 'date',
    months: typeof at === 'object' && 'months' in at ? at.months.map(String) : empty.months,
    date: typeof at === 'object' && 'date' in at ? at.date : empty.date,
    keep: keep === null ? 'none' : 'amount' in keep ? 'amount' : 'average',
    keepAmount: keep && 'amount' in keep ? keep.amount : '',
    keepCycles: keep && 'averageCycles' in keep ? String(keep.averageCycles) : empty.keepCycles,
    keepUsage: keep && 'usage' in keep ? keep.usage : empty.keepUsage,
    atLeast: trueUp.atLeast,
    action: trueUp.action,
    priced: trueUp.ratesOf ? 'share' : trueUp.rates ? 'own' : 'asItIs',
    to: trueUp.to ?? '',
    fee: trueUp.fee,
  };
}

/** Prices of every item laid side by side by date: one row for each day on which any of them changes. */
class Prices {
  readonly byDay = new Map<string, Record<string, string>>();

  add(item: string, rates: readonly RateRow[], percent = false): void {
    for (const row of rates) {
      const cells = this.byDay.get(row.from) ?? {};
      cells[cellKey(item, row.season ?? '', row.period ?? '', row.tier ?? null)] = percent
        ? percentOfFraction(row.rate)
        : row.rate;
      this.byDay.set(row.from, cells);
    }
  }

  rows(): PriceRow[] {
    return [...this.byDay.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([from, cells]) => ({ from, cells }));
  }
}
