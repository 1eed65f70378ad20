import type { PrintedLine } from '../facts/papers.ts';
import { sayMoney } from '../ledger/say.ts';
import type { Charge, RatePlan } from '../settlement/plan.ts';
import { priceAmount, priceQuantity } from '../settlement/price.ts';
import { exactText, plus, type Qty, qtyOfText, sizeOf } from '../settlement/quantity.ts';
import { type Cents, cents, dollarsText, sumCents } from '../units/cents.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { isCarried } from './electric-lines.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { LINE_TOLERANCE_CENTS } from './tolerance.ts';

/** `words` says the price, and is asked for only where it differs. */
type Priced = { amountCents: Cents; words: () => string | undefined } | { why: string };

/**
 * Each printed line at the plan's price for its *billed* quantity, kept apart from the quantity's own check (ledger.md §4); taxes on their base of
 * billed lines. Lines of one component (a price that changes inside the cycle) are taken together, a cent for each.
 */
export function linePriceChecks(context: CheckContext): Check[] {
  const { paper, settled } = context;
  if (settled.plan === null || paper.split !== null) return [];
  const { plan } = settled.plan;
  const checks: Check[] = [];
  const done = new Set<string>();
  paper.lines.forEach((line, at) => {
    const component = settled.components[at] ?? null;
    if (component === null) {
      if (!isCarried(line, null)) checks.push(unknownLine(line, at));
      return;
    }
    if (done.has(component) || plan.banks.some((bank) => bank.id === component)) return;
    done.add(component);
    const same = paper.lines.filter((_, i) => settled.components[i] === component);
    checks.push(priceCheck(context, plan, component, line.label, same));
  });
  return checks;
}

function priceCheck(
  context: CheckContext,
  plan: RatePlan,
  component: string,
  label: string,
  lines: readonly PrintedLine[],
): Check {
  const title = `Price of ${label}`;
  const stated = sumCents(lines.map((line) => line.amountCents));
  const priced = priceOf(context, plan, component, lines);
  if ('why' in priced) {
    return nothingToCompare('linePrice', component, 'USD', { title, stated: dollarsText(stated), cause: priced.why });
  }
  const sides = { stated, found: priced.amountCents, tolerance: cents(LINE_TOLERANCE_CENTS * lines.length) };
  return compareCents('linePrice', component, title, sides, () => ({
    cause: `${label} is billed at ${sayMoney(stated)}; by the rate plan it is ${[priced.words(), sayMoney(priced.amountCents)].join(', ')}.`,
    advice:
      'Compare the rate printed with the plan. If the utility changed it, add the new rate to the plan with its date.',
  }));
}

function priceOf(context: CheckContext, plan: RatePlan, component: string, lines: readonly PrintedLine[]): Priced {
  const charge = plan.charges.find((one) => one.id === component) ?? null;
  const quantity = quantityOf(context, charge, lines);
  if (typeof quantity === 'string') {
    const { from, to } = context.paper;
    const amountCents = priceAmount(plan, component, from, to, quantity);
    if (amountCents !== null) {
      return { amountCents, words: () => priceQuantity(plan, component, from, to, quantity)?.working.words };
    }
  }
  // What the plan prices only in its place among the other lines (a minimum, kWh by period, a tax after credits) is taken from the bill settled on
  // the billed kWh.
  const placed = context.settled.asBilled?.settlement.lines.filter((line) => line.component === component) ?? [];
  if (placed.length > 0 && (quantity !== null || charge?.basis === 'floor' || charge?.afterCredits === true)) {
    return {
      amountCents: sumCents(placed.map((line) => line.amountCents)),
      words: () => placed.map((line) => line.working.words).join(', '),
    };
  }
  return { why: unpriced(charge, quantity) };
}

/** What is missing to price a line that neither the plan alone nor the settled bill says. */
function unpriced(charge: Charge | null, quantity: string | null): string {
  if (quantity !== null || charge?.basis === 'floor') return 'The rate plan cannot price this line by itself.';
  if (charge?.basis === 'percent') return 'A line this percentage is taken on is not printed.';
  return 'The statement prints no quantity for this line. Add it to check the price.';
}

/** The quantity to price: printed kWh, the cycle, its days, or for a percentage the billed lines it is taken on; null when not printed. */
function quantityOf(context: CheckContext, charge: Charge | null, lines: readonly PrintedLine[]): string | null {
  if (charge?.basis === 'cycle') return '1';
  if (charge?.basis === 'day') return String(context.paper.days);
  if (charge?.basis === 'percent') return charge.afterCredits ? null : billedBase(context, charge.on);
  let sum: Qty = 0;
  for (const line of lines) {
    if (line.quantity === null) return null;
    sum = plus(sum, sizeOf(qtyOfText(line.quantity)));
  }
  return exactText(sum);
}

/** USD of the billed lines of these components; null where one of them is not printed. */
function billedBase({ paper, settled }: CheckContext, on: readonly string[]): string | null {
  const found = new Set<string>();
  const amounts: Cents[] = [];
  paper.lines.forEach((line, at) => {
    const component = settled.components[at] ?? null;
    if (component === null || !on.includes(component)) return;
    found.add(component);
    amounts.push(line.amountCents);
  });
  return on.every((id) => found.has(id)) ? dollarsText(sumCents(amounts)) : null;
}

function unknownLine(line: PrintedLine, at: number): Check {
  return nothingToCompare('linePrice', `printed${at + 1}`, 'USD', {
    title: `Price of ${line.label}`,
    stated: dollarsText(line.amountCents),
    cause: 'The rate plan has no such line.',
    advice: 'If it belongs to your rates, add it to the plan; if not, ask the utility what it is for.',
  });
}
