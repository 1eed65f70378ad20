import type { ChangeBy, Charge, Netting, RatePlan } from '#shared/settlement/plan.ts';

/** A plan's season: `id` stands in the form; the plan's own id follows the name. Days are "MM-DD". */
export type SeasonForm = { id: string; name: string; from: string; to: string };
export type HoursForm = { season: string; days: 'weekday' | 'weekend' | 'all'; from: string; to: string };
export type PeriodForm = { id: string; label: string; rest: boolean; hours: HoursForm[] };

/** How an item's prices differ. Its cells are the seasons × periods × tiers it is priced by. */
export type PricedBy = { bySeason: boolean; byPeriod: boolean };
export type TierForm = { from: string; season: string; per: 'cycle' | 'day'; limits: string };
/** A share of what the named charges cost, in percent. */
export type ShareForm = { shareOf: string[]; sharePercent: string; shareTier: string };

export type ChargeForm = PricedBy & {
  id: string;
  label: string;
  kind: Charge['kind'];
  basis: Charge['basis'];
  /** '' where the plan's own netting holds. */
  netting: Netting | '';
  kWOf: 'dc' | 'ac' | 'demand' | '';
  on: string[];
  per: 'cycle' | 'day' | '';
  afterCredits: boolean;
  solarOnly: boolean;
  learned: boolean;
  tiers: TierForm[];
};

export type CreditForm = PricedBy &
  ShareForm & {
    id: string;
    label: string;
    kind: 'export' | 'incentive';
    basis: 'export' | 'production';
    netting: Netting | '';
    priced: 'own' | 'share';
    termFrom: string;
    termTo: string;
    capAmount: string;
    capPer: 'year' | 'term';
    /** A money bank's id, `bill` or `separate`. */
    to: string;
  };

export type TrueUpForm = PricedBy &
  ShareForm & {
    at: 'months' | 'date' | 'everyCycle' | 'finalBill';
    months: string[];
    date: string;
    keep: 'none' | 'amount' | 'average';
    keepAmount: string;
    keepCycles: string;
    keepUsage: 'import' | 'load' | 'net';
    atLeast: string;
    action: 'expire' | 'donate' | 'pay';
    priced: 'asItIs' | 'own' | 'share';
    to: 'bill' | 'separate' | '';
    fee: string;
  };

export type BankForm = {
  id: string;
  label: string;
  unit: 'kWh' | 'USD';
  netting: Netting | '';
  byPeriod: boolean;
  ifPeriodAbsent: 'hold' | 'otherPeriods';
  ratio: string;
  sameCycle: boolean;
  offsets: string[];
  keepMinimum: string;
  belowZero: boolean;
  /** Empty where credit does not age. */
  lotCycles: string;
  trueUps: TrueUpForm[];
};

/** The prices from a day on, by cell. In a later row an empty cell means "as before". */
export type PriceRow = { from: string; cells: Record<string, string> };

/** A whole rate plan in the order of a rate sheet. Figures are text as typed, percents as percents. */
export type PlanForm = {
  name: string;
  seasons: SeasonForm[];
  periods: PeriodForm[];
  /** Dates, one on a line. */
  holidays: string;
  holidaysAs: 'weekend' | 'weekday';
  charges: ChargeForm[];
  netting: Netting;
  credits: CreditForm[];
  banks: BankForm[];
  prices: PriceRow[];
  load: RatePlan['load'];
  rateChangeBy: ChangeBy;
  seasonBy: ChangeBy;
  rounding: RatePlan['rounding'];
};
