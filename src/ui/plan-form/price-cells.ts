import type { ChargeForm, CreditForm, PlanForm, PricedBy, TrueUpForm } from './plan-form.ts';

/** Something of the plan that has prices of its own: a charge, a credit, or what a bank pays. */
export type PricedItem = {
  key: string;
  label: string;
  unit: string;
  percent: boolean;
  cells: PriceCell[];
};
/** One price of an item: `label` says for which season, period and tier; empty for the only one. */
export type PriceCell = { key: string; season: string; period: string; tier: number | null; label: string };

export function trueUpKey(bankId: string, index: number): string {
  return `${bankId}#${index}`;
}

export function cellKey(item: string, season: string, period: string, tier: number | null): string {
  return [item, season, period, tier ?? ''].join('|');
}

/** Tiers of a charge: one more than its longest row of limits; 0 without. */
export function tierCount(charge: Pick<ChargeForm, 'tiers'>): number {
  const most = Math.max(0, ...charge.tiers.map((row) => limitsOf(row.limits).length));
  return charge.tiers.length === 0 ? 0 : most + 1;
}

export function limitsOf(text: string): string[] {
  return text
    .split(/[;\s]+|,(?!\d{3}(?!\d))/)
    .map((part) => part.trim())
    .filter((part) => part !== '');
}

/** Everything in the plan that needs prices, in its order. */
export function pricedItems(form: PlanForm): PricedItem[] {
  const item = (
    key: string,
    label: string,
    unit: string,
    part: PricedBy,
    tiers: number,
    percent = false,
  ): PricedItem => ({ key, label, unit, percent, cells: cellsOf(form, key, part, tiers) });
  return [
    ...form.charges.map((charge) =>
      item(charge.id, charge.label, unitOf(charge), charge, tierCount(charge), charge.basis === 'percent'),
    ),
    ...form.credits
      .filter((credit) => credit.priced === 'own')
      .map((credit: CreditForm) => item(credit.id, credit.label, '$ per kWh', credit, 0)),
    ...form.banks.flatMap((bank) =>
      bank.trueUps.flatMap((trueUp: TrueUpForm, index) =>
        trueUp.action === 'pay' && trueUp.priced === 'own'
          ? [item(trueUpKey(bank.id, index), `${bank.label}, paid for each kWh left`, '$ per kWh', trueUp, 0)]
          : [],
      ),
    ),
  ];
}

function unitOf(charge: ChargeForm): string {
  switch (charge.basis) {
    case 'cycle':
      return '$ a bill';
    case 'day':
      return '$ a day';
    case 'kW':
      return '$ per kW';
    case 'percent':
      return '%';
    case 'floor':
      return charge.per === 'day' ? '$ a day' : '$ a bill';
    default:
      return '$ per kWh';
  }
}

function cellsOf(form: PlanForm, item: string, by: PricedBy, tiers: number): PriceCell[] {
  const seasons = by.bySeason ? form.seasons : [null];
  const periods = by.byPeriod ? form.periods : [null];
  const steps = tiers > 0 ? Array.from({ length: tiers }, (_, index) => index + 1) : [null];
  const first = form.prices[0]?.cells ?? {};
  return seasons.flatMap((season) =>
    periods.flatMap((period) =>
      steps.flatMap((tier) => {
        const key = cellKey(item, season?.id ?? '', period?.id ?? '', tier);
        // A period without hours in a season has no price there, unless one is written all the same.
        const occurs =
          !season ||
          !period ||
          period.rest ||
          period.hours.some((hours) => hours.season === '' || hours.season === season.id);
        if (!occurs && (first[key] ?? '') === '') return [];
        const words = [season?.name, period?.label || period?.id, tier === null ? undefined : `tier ${tier}`];
        return [
          {
            key,
            season: season?.id ?? '',
            period: period?.id ?? '',
            tier,
            label: words.filter((word) => word !== undefined).join(', '),
          },
        ];
      }),
    ),
  );
}
