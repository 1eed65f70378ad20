import type { RatePlan, RateRow } from '#shared/settlement/plan.ts';

/** True where two plans say the same, whatever way they spell a number, order their price rows or leave a default out. */
export function samePlan(one: RatePlan, other: RatePlan): boolean {
  return JSON.stringify(plainPlan(one)) === JSON.stringify(plainPlan(other));
}

function plainPlan(plan: RatePlan): unknown {
  const own = <T extends { netting: RatePlan['netting'] | null; rates?: RateRow[] | null }>(part: T) => ({
    ...part,
    netting: part.netting ?? plan.netting,
    ...(part.rates ? { rates: ordered(part.rates) } : {}),
  });
  // With no season, no rule depends on how a change of season is decided.
  const seasonBy = plan.calendar.seasons.length === 0 ? 'readDate' : plan.seasonBy;
  return sorted({
    ...plan,
    seasonBy,
    charges: plan.charges.map(own),
    credits: plan.credits.map(own),
    banks: plan.banks.map((bank) => ({
      ...own(bank),
      trueUps: bank.trueUps.map((trueUp) => ({ ...trueUp, rates: trueUp.rates && ordered(trueUp.rates) })),
    })),
  });
}

/** Price rows by day, season, period and tier: their order says nothing, since no two of a plan's grid hold at once. */
function ordered(rates: readonly RateRow[]): RateRow[] {
  const key = (row: RateRow) => [row.from, row.season ?? '', row.period ?? '', row.tier ?? ''].join('|');
  return [...rates].sort((a, b) => (key(a) < key(b) ? -1 : 1));
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
