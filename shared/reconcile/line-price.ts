import type { PrintedLine } from '../facts/papers.ts';
import type { Charge, RatePlan } from '../settlement/plan.ts';
import { type PriceOf, priceAmount, priceQuantity } from '../settlement/price.ts';
import { exactText, plus, type Qty, qtyOfText, sizeOf } from '../settlement/quantity.ts';
import { type Cents, dollarsText, subtractCents, sumCents } from '../units/cents.ts';
import { Exact, exact } from '../units/rate.ts';
import type { CheckContext } from './check-context.ts';
import { lastDigit } from './tolerance.ts';

/** `words` says the price, and is asked for only where it differs. */
export type Priced = { amountCents: Cents; words: () => string | undefined } | { why: string };

/** The printed lines of one component at one of its prices: `part` is null where it has one, or where its lines cannot be told apart. */
export type LineGroup = { component: string; part: PriceOf | null; label: string; lines: PrintedLine[] };

/**
 * What a group of printed lines comes to at the plan's price for their billed quantity; where their kWh are those of the settled bill, rounded for
 * the page, what that bill has. `why` says in a sentence what is missing to price them.
 */
export function priceOf(
  context: CheckContext,
  plan: RatePlan,
  group: LineGroup,
  stated: Cents,
  tolerance: Cents,
): Priced {
  const { component, part, lines } = group;
  const charge = plan.charges.find((one) => one.id === component) ?? null;
  const quantity = quantityOf(context, plan, charge, lines);
  const placed = placedPrice(context, group);
  if (typeof quantity === 'string') {
    const { from, to } = context.paper;
    const of = part ?? undefined;
    const amountCents = priceAmount(plan, component, from, to, quantity, of);
    if (amountCents !== null) {
      const own = { amountCents, words: () => priceQuantity(plan, component, from, to, quantity, of)?.working.words };
      const off = Math.abs(subtractCents(stated, amountCents));
      const nearer = off > tolerance && placed !== null && isPrintedOf(quantity, lines, placed.quantity);
      return nearer && Math.abs(subtractCents(stated, placed.amountCents)) < off ? placed : own;
    }
  }
  // What the plan prices only in its place among the other lines (a minimum, kWh by period, a tax after credits) is taken from the bill settled on
  // the billed kWh.
  if (placed && (quantity !== null || charge?.basis === 'floor' || (charge !== null && isOnUnprinted(plan, charge))))
    return placed;
  return { why: unpriced(charge, quantity) };
}

/** What these lines come to in the bill settled on the billed kWh; null where it has none such. */
function placedPrice(
  context: CheckContext,
  { component, part }: LineGroup,
): { amountCents: Cents; words: () => string; quantity: string | null } | null {
  const lines = (context.settled.asBilled?.settlement.lines ?? []).filter(
    (line) =>
      line.component === component && (part === null || (line.period === part.period && line.tier === part.tier)),
  );
  if (lines.length === 0) return null;
  const kWh = lines.flatMap((line) => (line.unit === 'kWh' && line.quantity !== null ? [line.quantity] : []));
  return {
    amountCents: sumCents(lines.map((line) => line.amountCents)),
    words: () => lines.map((line) => line.working.words).join(', '),
    quantity:
      kWh.length === lines.length ? exactText(kWh.reduce<Qty>((sum, one) => plus(sum, qtyOfText(one)), 0)) : null,
  };
}

/** Whether printed kWh are these kWh rounded as printed: the bill was worked out before its kWh were rounded for the page. */
function isPrintedOf(printed: string, lines: readonly PrintedLine[], kWh: string | null): boolean {
  if (kWh === null) return false;
  const off = exact(printed).minus(exact(kWh).abs()).abs();
  const texts = lines.map((line) => line.quantity).filter((quantity) => quantity !== null);
  const rounded = texts.reduce((sum, text) => sum.plus(lastDigit(text)), new Exact(0));
  return off.lte(rounded);
}

/** What is missing to price a line that neither the plan alone nor the settled bill says. */
function unpriced(charge: Charge | null, quantity: string | null): string {
  if (quantity !== null || charge?.basis === 'floor') return 'The rate plan cannot price this line by itself.';
  if (charge?.basis === 'percent') return 'A line this percentage is taken on is not printed.';
  return 'The statement prints no quantity for this line. Add it to check the price.';
}

/** The quantity to price: printed kWh, the cycle, its days, or for a percentage the billed lines it is taken on; null when not printed. */
function quantityOf(
  context: CheckContext,
  plan: RatePlan,
  charge: Charge | null,
  lines: readonly PrintedLine[],
): string | null {
  if (charge?.basis === 'cycle') return '1';
  if (charge?.basis === 'day') return String(context.paper.days);
  if (charge?.basis === 'percent') return isOnUnprinted(plan, charge) ? null : billedBase(context, charge.on);
  let sum: Qty = 0;
  for (const line of lines) {
    if (line.quantity === null) return null;
    sum = plus(sum, sizeOf(qtyOfText(line.quantity)));
  }
  return exactText(sum);
}

/** A percentage whose base no line prints: what credits leave to pay, or charges before the kWh a bank took off them. */
function isOnUnprinted(plan: RatePlan, charge: Charge): boolean {
  if (charge.basis !== 'percent') return false;
  const banked = (id: string) => plan.banks.some((bank) => bank.unit === 'kWh' && bank.offsets.includes(id));
  return charge.afterCredits || charge.on.some(banked);
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
