import type { PlanForm, PriceRow } from './plan-form.ts';
import { type PriceCell, pricedItems } from './price-cells.ts';

/**
 * The form after a change, with the prices it newly asks for begun at those typed before: each season, period or tier begins at the price it had
 * in common, and one price for all begins at the one they shared. What was typed is never dropped: a price no longer asked for waits in its
 * cell for the question to come back.
 */
export function withPricesCarried(before: PlanForm, after: PlanForm): PlanForm {
  const asked = new Map(pricedItems(before).map((item) => [item.key, item.cells]));
  const begun = new Map<string, readonly PriceCell[]>();
  for (const item of pricedItems(after)) {
    const old = asked.get(item.key) ?? [];
    for (const cell of item.cells) {
      if (old.length > 0 && !old.some(({ key }) => key === cell.key))
        begun.set(
          cell.key,
          old.filter((one) => covers(one, cell)),
        );
    }
  }
  if (begun.size === 0) return after;
  return { ...after, prices: after.prices.map((row) => carried(row, begun)) };
}

function carried(row: PriceRow, begun: ReadonlyMap<string, readonly PriceCell[]>): PriceRow {
  const cells = { ...row.cells };
  for (const [key, from] of begun) {
    const [text, ...others] = new Set(from.map((one) => row.cells[one.key] ?? ''));
    if ((cells[key] ?? '') === '' && text && others.length === 0) cells[key] = text;
  }
  return { ...row, cells };
}

/** Whether two prices can hold at once: each is for the other's season, period and tier, or for all of them. */
function covers(one: PriceCell, other: PriceCell): boolean {
  const meets = <T>(a: T, b: T, all: T) => a === all || b === all || a === b;
  return (
    meets(one.season, other.season, '') && meets(one.period, other.period, '') && meets(one.tier, other.tier, null)
  );
}
