import { seasonOf } from '../../settlement/calendar.ts';
import type { RatePlan } from '../../settlement/plan.ts';
import type { SettledAmounts } from '../../settlement/settle.ts';
import type { CycleUsage } from '../../settlement/settlement.ts';
import { type Edit, edit, hypothesis, type Place } from './edit.ts';
import { type OtherPrices, otherPrices } from './other-prices.ts';
import { sayList } from './plan-edit.ts';
import { type PricedItem, pricedItems } from './priced-items.ts';

/**
 * A right quantity at a price of another season, version, period or tier, or a credit at half its price (net-metering.md §4, "wrong rate": try
 * neighbouring seasons and versions). Each item alone; all that have such a price and are billed otherwise; and a change inside the cycle taken by
 * the read date instead of by days, or the other way round.
 */
export const wrongRate = hypothesis('wrongRate', editsOf);

type Priced = { item: PricedItem; prices: OtherPrices };

function editsOf(place: Place): Edit[] {
  const { plan, usage } = place.cycle;
  const alone: Edit[] = [];
  const together = new Map<string, Priced[]>();
  const items = pricedItems(plan).filter(({ id }) => place.mayDiffer(id));
  for (const item of items) {
    const explains = explainsAll(place, [item.id]);
    for (const prices of otherPrices(plan, item, usage)) {
      if (explains) alone.push(pricedAlone(place, item, prices));
      together.set(prices.key, [...(together.get(prices.key) ?? []), { item, prices }]);
    }
  }
  const all = [...together.values()]
    .filter(
      (made) =>
        made.length > 1 &&
        explainsAll(
          place,
          made.map(({ item }) => item.id),
        ),
    )
    .map((made) => pricedTogether(plan, made));
  return [...alone, ...all, ...changedBy(plan, usage)];
}

/** Whether other prices of these items can be all that is wrong: no charge that goes by nothing but its own price is billed otherwise. */
function explainsAll({ cycle: { plan }, differs }: Place, ids: readonly string[]): boolean {
  return plan.charges.every(
    ({ id, basis }) => basis === 'percent' || basis === 'floor' || ids.includes(id) || !differs.has(id),
  );
}

function pricedAlone({ cycle: { plan, usage }, truth }: Place, item: PricedItem, prices: OtherPrices): Edit {
  return edit(
    `${item.id} ${prices.key}`,
    { plan: item.put(plan, prices) },
    (settled) => {
      const rates = onlyRates(truth, settled, item.id);
      if (rates === null) return `${item.label} was priced at ${prices.said}.`;
      const [taken, right] = rates;
      const season = prices.found.season === undefined ? null : seasonOf(plan.calendar, usage.to);
      const instead = season === null ? right : `the ${season} rate, ${right}`;
      return `${item.label} was priced at ${prices.said}, ${taken}, instead of ${instead}.`;
    },
    { ...prices.found, items: item.id },
  );
}

function pricedTogether(plan: RatePlan, made: readonly Priced[]): Edit {
  const labels = [...new Set(made.map(({ item }) => item.label))];
  const [said] = made.map(({ prices }) => prices.said);
  const found: Record<string, string> = Object.assign({}, ...made.map(({ prices }) => prices.found));
  return edit(
    made.map(({ item, prices }) => `${item.id} ${prices.key}`).join(),
    { plan: made.reduce((changed, { item, prices }) => item.put(changed, prices), plan) },
    `${sayList(labels)} were priced at ${said}.`,
    { ...found, items: [...new Set(made.map(({ item }) => item.id))].join(', ') },
  );
}

/** The one rate of an item that was taken, and the one it should have been; null where there are several. */
function onlyRates(truth: SettledAmounts, made: SettledAmounts, id: string): [string, string] | null {
  const right = ratesOf(truth, id);
  const taken = ratesOf(made, id);
  const [only, ...more] = taken.filter((rate) => !right.includes(rate));
  const [instead, ...others] = right.filter((rate) => !taken.includes(rate));
  if (only === undefined || instead === undefined || more.length + others.length > 0) return null;
  return [only, instead];
}

function ratesOf({ settlement: { lines, payouts } }: SettledAmounts, id: string): string[] {
  const rates = [...lines, ...payouts].flatMap(({ component, rate, unit }) =>
    component === id && rate !== null ? [unit === 'USD' ? rate : `$${rate}`] : [],
  );
  return [...new Set(rates)];
}

/** A price or season that changes inside the cycle, shared by days or taken by the read date. */
function changedBy(plan: RatePlan, { from, to }: CycleUsage): Edit[] {
  const priceChanges = pricedItems(plan).some(({ rates }) => rates.some((row) => row.from > from && row.from < to));
  const seasonChanges = seasonOf(plan.calendar, from) !== seasonOf(plan.calendar, to);
  return (['days', 'readDate'] as const).flatMap((by) => {
    const how = by === 'days' ? 'shared by days' : 'taken by the read date for the whole cycle';
    const found = { price: 'change', by };
    const made: Edit[] = [];
    if (priceChanges && plan.rateChangeBy !== by)
      made.push(edit(`price ${by}`, { plan: { ...plan, rateChangeBy: by } }, `The price change was ${how}.`, found));
    if (seasonChanges && plan.seasonBy !== by)
      made.push(edit(`season ${by}`, { plan: { ...plan, seasonBy: by } }, `The change of season was ${how}.`, found));
    return made;
  });
}
