import { type RatePlan, type RatePlanInput, type RateRow, ratePlanSchema } from '#shared/settlement/plan.ts';
import type { Day } from '#shared/units/day.ts';
import { fractionOfPercent, plainDecimal } from '#src/lib/typed-values.ts';
import type { BankForm, ChargeForm, CreditForm, HoursForm, PlanForm, ShareForm, TrueUpForm } from './plan-form.ts';
import { cellKey, limitsOf, tierCount, trueUpKey } from './price-cells.ts';
import { type Ids, seasonIds } from './season-ids.ts';

/** The plan a form says, for the server to judge; figures that do not read are left out. */
export function planInput(form: PlanForm, timeZone: string): RatePlanInput {
  const ids = seasonIds(form);
  const nettingOf = <T extends { netting: ChargeForm['netting'] }>(part: T) =>
    part.netting === '' ? null : part.netting;
  const rates = (key: string, by: { bySeason: boolean; byPeriod: boolean }, tiers = 0, percent = false): RateRow[] =>
    rateRows(form, ids, key, by, tiers, percent);
  const dates = form.holidays.split(/[\s,;]+/).filter((text) => text !== '');
  return {
    name: form.name.trim(),
    timeZone,
    netting: form.netting,
    load: form.load,
    rateChangeBy: form.rateChangeBy,
    seasonBy: form.seasonBy,
    calendar: {
      seasons: form.seasons.map(({ id, from, to }) => ({ id: ids(id), from, to })),
      periods: form.periods.map(({ id, label, rest, hours }) => ({
        id,
        label: label.trim(),
        when: rest ? ('rest' as const) : hours.flatMap((span) => spansOf(span, ids)),
      })),
      holidays: dates.length === 0 ? null : { dates: dates as Day[], as: form.holidaysAs },
    },
    charges: form.charges.map((charge) => ({
      id: charge.id,
      label: charge.label.trim(),
      kind: charge.kind,
      basis: charge.basis,
      rates: rates(charge.id, charge, tierCount(charge), charge.basis === 'percent'),
      tiers: charge.tiers.map((row) => ({
        from: (row.from || form.prices[0]?.from || '') as Day,
        ...(row.season === '' ? {} : { season: ids(row.season) }),
        per: row.per,
        limits: limitsOf(row.limits).map((text) => plainDecimal(text) ?? text),
      })),
      netting: nettingOf(charge),
      kWOf: charge.kWOf === '' ? null : charge.kWOf,
      on: charge.on,
      per: charge.per === '' ? null : charge.per,
      afterCredits: charge.afterCredits,
      solarOnly: charge.solarOnly,
      learned: charge.learned,
    })),
    credits: form.credits.map((credit: CreditForm) => ({
      id: credit.id,
      label: credit.label.trim(),
      kind: credit.kind,
      basis: credit.basis,
      netting: nettingOf(credit),
      rates: credit.priced === 'own' ? rates(credit.id, credit) : null,
      ratesOf: credit.priced === 'share' ? shareOf(credit) : null,
      term:
        credit.termFrom === '' && credit.termTo === ''
          ? null
          : { firstDay: credit.termFrom as Day, lastDay: credit.termTo as Day },
      cap: credit.capAmount.trim() === '' ? null : { amount: number(credit.capAmount), per: credit.capPer },
      to: credit.to,
    })),
    banks: form.banks.map((bank: BankForm) => ({
      id: bank.id,
      label: bank.label.trim(),
      unit: bank.unit,
      netting: nettingOf(bank),
      byPeriod: bank.byPeriod,
      ifPeriodAbsent: bank.ifPeriodAbsent,
      ratio: number(bank.ratio),
      sameCycle: bank.sameCycle,
      offsets: bank.offsets,
      keepMinimum: bank.keepMinimum === '' ? null : bank.keepMinimum,
      belowZero: bank.belowZero,
      lotLife: bank.lotCycles.trim() === '' ? null : { cycles: Number(bank.lotCycles) },
      trueUps: bank.trueUps.map((trueUp, index) => trueUpOf(trueUp, rates(trueUpKey(bank.id, index), trueUp))),
    })),
    rounding: form.rounding,
  };
}

/** The plan of a form whose figures have been checked. Throws where the form does not hold its shape. */
export function planOf(form: PlanForm, timeZone: string): RatePlan {
  return ratePlanSchema.parse(planInput(form, timeZone));
}

function number(text: string): string {
  return plainDecimal(text) ?? text;
}

function shareOf(part: ShareForm) {
  return {
    charges: part.shareOf,
    fraction: fractionOfPercent(part.sharePercent) ?? part.sharePercent,
    tier: Number(part.shareTier),
  };
}

function trueUpOf(trueUp: TrueUpForm, rates: RateRow[]) {
  const at = {
    months: { months: trueUp.months.map(Number) },
    date: { date: trueUp.date },
    everyCycle: 'everyCycle' as const,
    finalBill: 'finalBill' as const,
  }[trueUp.at];
  const keep = {
    none: null,
    amount: { amount: number(trueUp.keepAmount) },
    average: { averageCycles: Number(trueUp.keepCycles), usage: trueUp.keepUsage },
  }[trueUp.keep];
  const pays = trueUp.action === 'pay';
  return {
    at,
    keep,
    atLeast: number(trueUp.atLeast),
    action: trueUp.action,
    rates: pays && trueUp.priced === 'own' ? rates : null,
    ratesOf: pays && trueUp.priced === 'share' ? shareOf(trueUp) : null,
    to: trueUp.to === '' ? null : trueUp.to,
    fee: number(trueUp.fee),
  };
}

/** Hours that run past midnight are two spans of the plan's language. */
function spansOf({ season, days, from, to }: HoursForm, ids: Ids) {
  const part = (start: string, end: string) => ({
    ...(season === '' ? {} : { season: ids(season) }),
    days,
    from: start,
    to: end,
  });
  if (to === '00:00') return [part(from, '24:00')];
  return from > to && from !== '24:00' ? [part('00:00', to), part(from, '24:00')] : [part(from, to)];
}

function rateRows(
  form: PlanForm,
  ids: Ids,
  item: string,
  by: { bySeason: boolean; byPeriod: boolean },
  tiers: number,
  percent: boolean,
): RateRow[] {
  const seasons = by.bySeason ? form.seasons.map(({ id }) => id) : [''];
  const periods = by.byPeriod ? form.periods.map(({ id }) => id) : [''];
  const steps = tiers > 0 ? Array.from({ length: tiers }, (_, index) => index + 1) : [null];
  return form.prices.flatMap((row) =>
    seasons.flatMap((season) =>
      periods.flatMap((period) =>
        steps.flatMap((tier) => {
          const text = row.cells[cellKey(item, season, period, tier)] ?? '';
          const rate = percent ? fractionOfPercent(text) : plainDecimal(text);
          if (rate === null) return [];
          return [
            {
              from: row.from as Day,
              ...(season === '' ? {} : { season: ids(season) }),
              ...(period === '' ? {} : { period }),
              ...(tier === null ? {} : { tier }),
              rate,
            },
          ];
        }),
      ),
    ),
  );
}
