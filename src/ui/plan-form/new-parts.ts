import type { BankForm, ChargeForm, CreditForm, PlanForm, PricedBy, ShareForm, TrueUpForm } from './plan-form.ts';

const FLAT: PricedBy = { bySeason: false, byPeriod: false };
const NO_SHARE: ShareForm = { shareOf: [], sharePercent: '100', shareTier: '1' };

export function newCharge(
  id: string,
  label: string,
  kind: ChargeForm['kind'],
  basis: ChargeForm['basis'],
  more: Partial<ChargeForm> = {},
): ChargeForm {
  return {
    ...FLAT,
    id,
    label,
    kind,
    basis,
    netting: '',
    kWOf: '',
    on: [],
    per: '',
    afterCredits: false,
    solarOnly: false,
    learned: false,
    tiers: [],
    ...more,
  };
}

export function newCredit(id: string, label: string, to: string, more: Partial<CreditForm> = {}): CreditForm {
  return {
    ...FLAT,
    ...NO_SHARE,
    id,
    label,
    kind: 'export',
    basis: 'export',
    netting: '',
    priced: 'own',
    termFrom: '',
    termTo: '',
    capAmount: '',
    capPer: 'year',
    to,
    ...more,
  };
}

export function newBank(id: string, label: string, unit: BankForm['unit'], more: Partial<BankForm> = {}): BankForm {
  return {
    id,
    label,
    unit,
    netting: '',
    byPeriod: false,
    ifPeriodAbsent: 'hold',
    ratio: '1',
    sameCycle: true,
    offsets: [],
    keepMinimum: '',
    belowZero: false,
    lotCycles: '',
    trueUps: [],
    ...more,
  };
}

export function newTrueUp(more: Partial<TrueUpForm> = {}): TrueUpForm {
  return {
    ...FLAT,
    ...NO_SHARE,
    at: 'months',
    months: ['4'],
    date: '03-31',
    keep: 'none',
    keepAmount: '',
    keepCycles: '4',
    keepUsage: 'import',
    atLeast: '0',
    action: 'expire',
    priced: 'asItIs',
    to: '',
    fee: '0',
    ...more,
  };
}

/** Net billing with one price: the plan a first-time owner starts from. */
export function emptyPlanForm(from: string): PlanForm {
  return {
    name: '',
    seasons: [],
    periods: [],
    holidays: '',
    holidaysAs: 'weekend',
    charges: [
      newCharge('energy', 'Energy', 'import', 'import'),
      newCharge('customer', 'Customer charge', 'fixed', 'cycle'),
    ],
    netting: 'none',
    credits: [newCredit('exportCredit', 'Export credit', 'creditBank')],
    banks: [newBank('creditBank', 'Credit bank', 'USD', { offsets: ['energy'] })],
    prices: [{ from, cells: {} }],
    load: 'none',
    rateChangeBy: 'days',
    seasonBy: 'readDate',
    rounding: { money: 'halfUp', limits: 'whole', kWh: 'exact' },
  };
}

/** An id no part of the plan has yet, from a stem such as `tax`: `tax`, `tax2`, `tax3` … */
export function freeId(taken: readonly string[], stem: string): string {
  for (let number = 1; ; number += 1) {
    const id = number === 1 ? stem : `${stem}${number}`;
    if (!taken.includes(id)) return id;
  }
}

export function partIds(form: PlanForm): string[] {
  return [...form.charges, ...form.credits, ...form.banks].map(({ id }) => id);
}
