import type { PrintedLine } from '../facts/papers.ts';
import { keptAt } from '../settlement/place.ts';
import type { RatePlan, RateRow, TierRow } from '../settlement/plan.ts';
import type { PriceOf } from '../settlement/price.ts';
import { compare, qtyOfText } from '../settlement/quantity.ts';
import type { SettledLine } from '../settlement/settlement.ts';
import { wordsOf } from './match.ts';

type Prices = { rates: readonly RateRow[]; tiers: readonly TierRow[]; words: ReadonlySet<string> };
type Told = { line: PrintedLine; at: number };

/**
 * Which of its component's prices each printed line is at, in order: its time-of-use period and tier. Null where the component has one price,
 * or where its lines cannot all be told apart: then they stand together. A line is told by the period or tier its label names, else by its
 * printed rate where only one has it, else by its place, where as many lines are printed as the cycle settles to.
 */
export function matchParts(
  lines: readonly PrintedLine[],
  components: readonly (string | null)[],
  plan: RatePlan,
  settled: readonly SettledLine[],
): (PriceOf | null)[] {
  const parts: (PriceOf | null)[] = lines.map(() => null);
  const done = new Set<string>();
  components.forEach((component) => {
    if (component === null || done.has(component)) return;
    done.add(component);
    const prices = pricesOf(plan, component);
    const byPeriod = prices?.rates.some((row) => row.period !== undefined) ?? false;
    if (prices === null || (!byPeriod && prices.tiers.length === 0)) return;
    const mine = lines.flatMap((line, at): Told[] => (components[at] === component ? [{ line, at }] : []));
    const ours = settled.filter((line) => line.component === component);
    const periods = byPeriod ? periodsOf(mine, prices, plan, ours) : mine.map(() => null);
    if (periods === null) return;
    const tiers = prices.tiers.length > 0 ? tiersOf(mine, prices, periods, ours) : mine.map(() => null);
    if (tiers === null) return;
    mine.forEach(({ at }, index) => {
      parts[at] = { period: periods[index] ?? null, tier: tiers[index] ?? null };
    });
  });
  return parts;
}

/** Says a part within its component: `energy:peak`, `energy:tier2`, `energy:peak:tier2`. */
export function partKey(component: string, part: PriceOf | null): string {
  const tier = part?.tier == null ? null : `tier${part.tier}`;
  return [component, part?.period ?? null, tier].filter((one) => one !== null).join(':');
}

/** The price rows of a charge or credit; a share of a retail price has those of the charges it is taken from. Null for a bank. */
function pricesOf(plan: RatePlan, component: string): Prices | null {
  const charge = plan.charges.find((one) => one.id === component);
  if (charge) return { rates: charge.rates, tiers: charge.tiers, words: wordsOf(charge.label) };
  const credit = plan.credits.find((one) => one.id === component);
  if (!credit) return null;
  const taken = credit.ratesOf?.charges ?? [];
  const shared = plan.charges.filter((one) => taken.includes(one.id)).flatMap((one) => one.rates);
  return {
    rates: credit.rates ?? shared,
    tiers: [],
    words: wordsOf(credit.label),
  };
}

/** The period of every line; null unless all are told. */
function periodsOf(
  mine: readonly Told[],
  prices: Prices,
  plan: RatePlan,
  ours: readonly SettledLine[],
): string[] | null {
  const named = plan.calendar.periods.map(({ id, label }) => ({
    id,
    words: wordsOf(label === '' ? apart(id) : label),
  }));
  const told = mine.map(({ line }) => {
    const words = wordsOf(line.label);
    const fits = named.filter((one) => one.words.size > 0 && [...one.words].every((word) => words.has(word)));
    // "Super off-peak" holds the words of "off-peak" too: the most words win.
    const most = Math.max(0, ...fits.map((one) => one.words.size));
    const best = fits.filter((one) => one.words.size === most);
    return only(best.map(({ id }) => id)) ?? only(atRate(prices.rates, line).map((row) => row.period));
  });
  return complete(
    told,
    placed(ours, ({ period }) => period),
  );
}

/** The tier of every line; null unless all are told, and more than one: a single line may hold the kWh of several tiers. */
function tiersOf(
  mine: readonly Told[],
  prices: Prices,
  periods: readonly (string | null)[],
  ours: readonly SettledLine[],
): (number | null)[] | null {
  const last = Math.max(...prices.tiers.map((row) => row.limits.length)) + 1;
  const tiers: (number | null)[] = mine.map(() => null);
  for (const period of new Set(periods)) {
    const here = mine.map(({ line }, index) => ({ line, index })).filter(({ index }) => periods[index] === period);
    const rates = prices.rates.filter((row) => row.period === undefined || row.period === period);
    const told = here.map(
      ({ line }) => tierNamed(line.label, last) ?? only(atRate(rates, line).map((row) => row.tier)),
    );
    const of = ours.filter((line) => line.period === period);
    const all = complete(
      told,
      placed(of, ({ tier }) => tier),
    );
    if (all === null) return null;
    here.forEach(({ index }, at) => {
      tiers[index] = keptAt(all, at);
    });
  }
  return new Set(tiers).size > 1 ? tiers : null;
}

const FIRST_TIER = /\b(first|up to|baseline)\b/i;
const LAST_TIER = /\b(over|above|remaining|excess|all other|all additional)\b/i;

/** The tier a label names: "tier 2", "first 500 kWh", "over 1,000 kWh". */
function tierNamed(label: string, last: number): number | null {
  const number = /\b(?:tier|block|step|level)\s*(\d)\b/i.exec(label)?.[1];
  if (number !== undefined) return Number(number) <= last ? Number(number) : null;
  if (FIRST_TIER.test(label)) return 1;
  return LAST_TIER.test(label) ? last : null;
}

function atRate(rates: readonly RateRow[], line: PrintedLine): RateRow[] {
  const { rate } = line;
  if (rate === null) return [];
  return rates.filter((row) => compare(qtyOfText(row.rate), qtyOfText(rate)) === 0);
}

/** The one value a list comes to; null where it names none or several. */
function only<T extends string | number>(found: readonly (T | undefined)[]): T | null {
  const [first, ...more] = new Set(found);
  return first === undefined || more.length > 0 ? null : first;
}

/** What was told, or by place where nothing was; null where some lines stay untold. */
function complete<T>(told: readonly (T | null)[], inOrder: readonly T[]): T[] | null {
  if (told.every((one) => one === null)) return inOrder.length === told.length ? [...inOrder] : null;
  const known = told.filter((one) => one !== null);
  return known.length === told.length ? known : null;
}

function placed<T>(ours: readonly SettledLine[], of: (line: SettledLine) => T | null): T[] {
  return [...new Set(ours.map(of))].filter((one) => one !== null);
}

/** "offPeak" as words. */
function apart(id: string): string {
  return id.replace(/([a-z0-9])([A-Z])/g, '$1 $2');
}
