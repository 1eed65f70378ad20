import { sayDate, sayGap, sayKwh } from '../ledger/say.ts';
import { isComplete } from '../metering/cycle-energy.ts';
import { plus, type Qty, qtyOfText, sizeOf, whOfQty } from '../settlement/quantity.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { guessWords, incentiveGuesses } from './incentive-guess.ts';
import { compareWh, type Difference, nothingToCompare } from './make-check.ts';
import { cycleOfEnd, type Span, spanOf } from './programme.ts';

/** The kWh a payment should have been made on, and the cycles they were made in. */
type Paid = Pick<Span, 'cycles' | 'eligibleWh' | 'productionWh'>;

/** A whole-kWh register is right to ±1 kWh per difference (net-metering.md §5), and each cycle is one. */
const STEP_WH = 1000;
const WHOLE_KWH = 1000;
const TITLE = 'Incentive, kWh paid on against the production meter';
const ADVICE =
  'Write to whoever pays the incentive with both figures; the programme’s own terms say which meter counts.';

/**
 * The kWh an incentive was paid on, as a line of the statement or a receipt states them, are those of the production meter within the term
 * (net-metering.md §4 "incentive: qty=ΔP; date ≤ term; never E"). A receipt is checked in the cycle its days end in.
 */
export function incentiveQuantityChecks(context: CheckContext): Check[] {
  return [...lineChecks(context), ...receiptChecks(context)];
}

/** A line's kWh against the plan's own line where it was matched to one (meter, term and cap are the plan's), else against the production in the term. */
function lineChecks(context: CheckContext): Check[] {
  const { paper, settled, programme, metered } = context;
  const stated = new Map<string | null, Qty>();
  paper.lines.forEach((line, at) => {
    if (line.kind !== 'incentive' || line.quantity === null || line.unit !== 'kWh') return;
    const component = settled.components[at] ?? null;
    stated.set(component, plus(stated.get(component) ?? 0, sizeOf(qtyOfText(line.quantity))));
  });
  const { production } = metered.energy;
  const made = isComplete(production) ? production.wh : null;
  return [...stated].flatMap(([component, quantity]) => {
    const about = component ?? '';
    const billed = whOfQty(quantity);
    const own = programme?.cycles[paper.index];
    if (component === null && own === undefined) return [];
    const found = component === null ? (own?.made?.eligibleWh ?? null) : plannedWh(context, component);
    if (made === null || found === null) return [unknown(about, billed)];
    const span = { cycles: [paper.index], eligibleWh: found, productionWh: made };
    return [quantityCheck(context, about, billed, span, TITLE)];
  });
}

function plannedWh({ settled }: CheckContext, component: string): Wh | null {
  const settlement = settled.ours?.settlement;
  const lines = [...(settlement?.lines ?? []), ...(settlement?.payouts ?? [])];
  const own = lines.flatMap((line) => (line.component === component && line.quantity !== null ? [line.quantity] : []));
  return own.length === 0
    ? null
    : whOfQty(own.reduce((sum: Qty, quantity) => plus(sum, sizeOf(qtyOfText(quantity))), 0));
}

function receiptChecks(context: CheckContext): Check[] {
  const { paper, programme, index } = context;
  if (programme === null || programme.terms.paidAs !== 'separate') return [];
  return programme.receipts.flatMap(({ id, on, cover }) => {
    const quantity = programme.terms.received.find((receipt) => receipt.id === id)?.quantityWh ?? null;
    if (cover === null || quantity === null || cycleOfEnd(programme, cover.to)?.index !== paper.index) return [];
    const title = `${TITLE}, receipt of ${sayDate(on)}`;
    const span = spanOf(programme, index, cover.from, cover.to);
    if (typeof span === 'string') {
      return [nothingToCompare('incentiveQuantity', id, 'kWh', { title, stated: kwhText(quantity), cause: span })];
    }
    return [quantityCheck(context, id, quantity, span, title)];
  });
}

function quantityCheck(context: CheckContext, about: string, stated: Wh, span: Paid, title: string): Check {
  const tolerance = wh(STEP_WH * Math.max(1, span.cycles.length));
  return compareWh('incentiveQuantity', about, title, { stated, found: span.eligibleWh, tolerance }, () =>
    quantityTexts(context, stated, span),
  );
}

function quantityTexts(context: CheckContext, stated: Wh, span: Paid): Difference {
  const gap = wh(stated - span.eligibleWh);
  const size = `It was paid on ${sayGap(gap)} kWh ${gap < 0 ? 'less' : 'more'} than the production meter’s ${sayKwh(span.eligibleWh)}.`;
  // A quantity printed in whole kWh says no more than that.
  const step = stated % WHOLE_KWH === 0 ? WHOLE_KWH : 1;
  const same = incentiveGuesses(context, span).filter((guess) => Math.abs(guess.wh - stated) * 2 <= step);
  const words = guessWords(same);
  return { cause: words === null ? size : `${size} ${words}`, advice: ADVICE };
}

function unknown(about: string, stated: Wh): Check {
  return nothingToCompare('incentiveQuantity', about, 'kWh', {
    title: TITLE,
    stated: kwhText(stated),
    cause: 'The production of this cycle is not completely known.',
    advice: 'Add the production meter’s reads or upload a production file for the whole cycle.',
  });
}
