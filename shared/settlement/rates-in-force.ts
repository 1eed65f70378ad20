import type { Day } from '../units/day.ts';
import { exact } from '../units/rate.ts';
import type { Source, WorkingInput } from '../working.ts';
import type { RateRow, RatesOf, TierRow } from './plan.ts';
import { big, type Qty, qtyOfText, type Rate, rateOf } from './quantity.ts';

/** A price in force: the rate, and how a working says it. `formula` is a product over the names of `inputs`. */
export type Price = { rate: Rate; formula: string; inputs: readonly WorkingInput[] };

type PricedRow = {
  from: Day;
  season: string | null;
  period: string | null;
  tier: number | null;
  price: Price;
  source: Source;
};

/** The tier limits in force, in thousandths of kWh. */
export type Limits = { from: Day; season: string | null; per: 'cycle' | 'day'; limits: readonly Qty[]; source: Source };

/** How an item is priced, worked out once per plan. */
export type Pricing = {
  /** Rows of its own, and those of the charges its price is derived from. */
  own: readonly PricedRow[];
  tables: readonly (readonly PricedRow[])[];
  derived: { fraction: string; tier: number; words: string } | null;
  byPeriod: boolean;
  bySeason: boolean;
  tiers: readonly Limits[];
  /** Every day on which a row of the item comes into force, with the season it holds for, in order. */
  changes: readonly { from: Day; season: string | null }[];
  /** Derived prices by the rows they come from: a plan has few. */
  cache: { rows: readonly PricedRow[]; price: Price }[];
};

/** Latest first, and of the same day the one that names more: the order in which a row in force is looked for. */
function latestFirst(a: PricedRow, b: PricedRow): number {
  if (a.from !== b.from) return a.from < b.from ? 1 : -1;
  return named(b) - named(a);
}

function named(row: PricedRow): number {
  return (row.season === null ? 0 : 1) + (row.period === null ? 0 : 1) + (row.tier === null ? 0 : 1);
}

function pricedRow(row: RateRow, planName: string, unit: string): PricedRow {
  const source: Source = { kind: 'rule', name: planName, version: row.from };
  const input: WorkingInput = { name: 'rate', label: 'Rate', value: row.rate, unit, source };
  return {
    from: row.from,
    season: row.season ?? null,
    period: row.period ?? null,
    tier: row.tier ?? null,
    price: { rate: rateOf(row.rate), formula: 'rate', inputs: [input] },
    source,
  };
}

function limitsRow(row: TierRow, planName: string): Limits {
  return {
    from: row.from,
    season: row.season ?? null,
    per: row.per,
    limits: row.limits.map(qtyOfText),
    source: { kind: 'rule', name: planName, version: row.from },
  };
}

/** Pricing by rows of its own. `unit` is the rate's, for workings. */
export function ownPricing(
  rows: readonly RateRow[],
  tiers: readonly TierRow[],
  planName: string,
  unit: string,
): Pricing {
  const table = rows.map((row) => pricedRow(row, planName, unit)).sort(latestFirst);
  const limits = tiers
    .map((row) => limitsRow(row, planName))
    .sort((a, b) =>
      a.from < b.from ? 1 : a.from > b.from ? -1 : Number(b.season !== null) - Number(a.season !== null),
    );
  return {
    own: table,
    tables: [table],
    derived: null,
    byPeriod: table.some((row) => row.period !== null),
    bySeason: [...table, ...limits].some((row) => row.season !== null),
    tiers: limits,
    changes: [...table, ...limits].map(({ from, season }) => ({ from, season })),
    cache: [],
  };
}

/** Pricing as a fraction of the sum of other charges' rates at one of their tiers, by their periods and their changes. */
export function derivedPricing(ratesOf: RatesOf, charges: readonly { label: string; pricing: Pricing }[]): Pricing {
  const tables = charges.flatMap((charge) => charge.pricing.tables);
  const rows = tables.flat().filter((row) => row.tier === null || row.tier === ratesOf.tier);
  return {
    own: [],
    tables,
    derived: {
      fraction: ratesOf.fraction,
      tier: ratesOf.tier,
      words: charges.map((charge) => charge.label).join(' + '),
    },
    byPeriod: rows.some((row) => row.period !== null),
    bySeason: rows.some((row) => row.season !== null),
    tiers: [],
    changes: rows.map(({ from, season }) => ({ from, season })),
    cache: [],
  };
}

function rowInForce(
  table: readonly PricedRow[],
  date: Day,
  season: string | null,
  period: string | null,
  tier: number | null,
): PricedRow | null {
  for (const row of table) {
    if (row.from > date) continue;
    if (row.season !== null && row.season !== season) continue;
    if (row.period !== null && row.period !== period) continue;
    if (row.tier !== null && row.tier !== tier) continue;
    return row;
  }
  return null;
}

/** The price in force on a day for a season, a period and a tier; null when there is none. */
export function priceAt(
  pricing: Pricing,
  date: Day,
  season: string | null,
  period: string | null,
  tier: number | null,
): Price | null {
  const { derived, tables } = pricing;
  if (derived === null) return rowInForce(pricing.own, date, season, period, tier)?.price ?? null;
  const rows: PricedRow[] = [];
  for (const table of tables) {
    const row = rowInForce(table, date, season, period, derived.tier);
    if (row === null) return null;
    rows.push(row);
  }
  for (const known of pricing.cache) if (known.rows.every((row, index) => row === rows[index])) return known.price;
  const price = derivedPrice(rows, derived);
  pricing.cache.push({ rows, price });
  return price;
}

function derivedPrice(rows: readonly PricedRow[], derived: NonNullable<Pricing['derived']>): Price {
  const rates = rows.map((row) => row.price.rate.text);
  const sum = rates.reduce((total, rate) => total.plus(exact(rate)), big(0));
  const source = rows.reduce((latest, row) => (row.from > latest.from ? row : latest)).source;
  const inputs: WorkingInput[] = [{ name: 'rates', label: derived.words, value: rates, unit: 'USD/kWh', source }];
  if (derived.fraction === '1') return { rate: rateOf(sum.toString()), formula: 'sum(rates)', inputs };
  inputs.push({ name: 'fraction', label: 'Share of these rates', value: derived.fraction, unit: 'fraction', source });
  return { rate: rateOf(sum.times(exact(derived.fraction)).toString()), formula: 'sum(rates) * fraction', inputs };
}

/** The tier limits in force on a day, or null where the item has no tiers then. */
export function limitsAt(pricing: Pricing, date: Day, season: string | null): Limits | null {
  for (const row of pricing.tiers) {
    if (row.from <= date && (row.season === null || row.season === season)) return row;
  }
  return null;
}
