import { incentiveFor } from '../books/incentive.ts';
import type { IncentiveFacts } from '../facts/finance.ts';
import { sayDate, sayDay, sayKwh, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, dollarsText, negateCents, sumCents } from '../units/cents.ts';
import { daysBetween } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { isIncentiveInBill } from './electric-lines.ts';
import { guessWords, incentiveGuesses } from './incentive-guess.ts';
import { compareCents, nothingToCompare } from './make-check.ts';
import { cycleOfEnd, type Programme, type ProgrammeCycle, type Span, spanOf } from './programme.ts';
import { totalToleranceCents } from './tolerance.ts';

/** Half a year: payers settle by month, quarter or half-year, so that money earned longer ago is late (common practice, no source). */
const LATE_DAYS = 183;
const TITLE = 'Incentive, paid against earned';
const UNKNOWN = 'The production of this cycle is not completely known.';
const ASK = 'Ask whoever pays the incentive what became of it.';

/**
 * What was paid against rate × kWh in the term, rounded once a cycle (before income tax). Paid inside the bill: on the cycle itself, unless the line is the plan's own,
 * whose price and kWh are checks already. Paid apart: a receipt that states its days on the cycle they end in, over all of them; the others oldest earned
 * first.
 */
export function incentivePaidChecks(context: CheckContext): Check[] {
  const { programme, paper } = context;
  const cycle = programme?.cycles[paper.index];
  if (programme === null || cycle === undefined) return [];
  if (programme.terms.paidAs === 'billCredit') return inBill(context, programme, cycle);
  const covers = coverChecks(context, programme);
  return covers.length > 0 ? covers : apart(programme, cycle);
}

function inBill(context: CheckContext, { terms }: Programme, cycle: ProgrammeCycle): Check[] {
  const { paper, settled } = context;
  const lines = paper.lines.filter((line) => isIncentiveInBill(line, terms));
  const planned = paper.lines.some((line, at) => lines.includes(line) && settled.components[at] !== null);
  if (planned || (cycle.eligible === 0 && lines.length === 0)) return [];
  const { made } = cycle;
  if (made === null) return [nothing({ cause: UNKNOWN })];
  const earned = made.earnedCents;
  if (lines.length === 0) {
    const advice = earned === 0 ? null : `${sayMoney(earned)} was earned. ${ASK}`;
    return [nothing({ found: earned, cause: 'The statement has no line for the incentive.', advice })];
  }
  const stated = negateCents(sumCents(lines.map((line) => line.amountCents)));
  return [paidCheck(context, terms, { about: '', title: TITLE, stated }, { ...made, cycles: [paper.index] })];
}

/** The receipts whose days end in this cycle. */
function coverChecks(context: CheckContext, programme: Programme): Check[] {
  const { paper, index } = context;
  return programme.receipts.flatMap(({ id, on, amountCents, cover }) => {
    if (cover === null || cycleOfEnd(programme, cover.to)?.index !== paper.index) return [];
    const title = `${TITLE}, receipt of ${sayDate(on)}`;
    const span = spanOf(programme, index, cover.from, cover.to);
    if (typeof span === 'string') return [nothing({ about: id, title, stated: amountCents, cause: span })];
    return [paidCheck(context, programme.terms, { about: id, title, stated: amountCents }, span)];
  });
}

function paidCheck(
  context: CheckContext,
  terms: IncentiveFacts,
  { about, title, stated }: { about: string; title: string; stated: Cents },
  span: Span,
): Check {
  const earned = span.earnedCents;
  const tolerance = cents(totalToleranceCents(span.cycles.length));
  return compareCents('incentivePaid', about, title, { stated, found: earned, tolerance }, () => {
    const gap = sayMoney(cents(Math.abs(stated - earned)));
    const size = `${gap} ${stated < earned ? 'less' : 'more'} than ${sayMoney(earned)} earned on ${sayKwh(span.eligibleWh)} kWh.`;
    const same = incentiveGuesses(context, span).filter((guess) => incentiveFor(terms, guess.wh, 1, 1) === stated);
    const words = guessWords(same);
    return { cause: words === null ? size : `${size} ${words}`, advice: ASK };
  });
}

/** A cycle in which no stated days end: which receipt settles it, or what is still owed. */
function apart(programme: Programme, cycle: ProgrammeCycle): Check[] {
  if (cycle.eligible === 0) return [];
  const { receipts, cycles, through } = programme;
  for (const { on, cover } of receipts) {
    if (cover === null || cover.from >= cycle.to || cover.to <= cycle.from) continue;
    const end = cycleOfEnd(programme, cover.to);
    const where =
      end === null ? ' and days that are on no statement yet' : `; it is compared in the cycle to ${sayDate(end.to)}`;
    const found = cycle.made?.earnedCents ?? null;
    return [nothing({ found, cause: `The receipt of ${sayDate(on)} covers this cycle${where}.` })];
  }
  if (cycle.made === null) return [nothing({ cause: UNKNOWN })];
  const { earnedCents: earned, owedCents, parts } = cycle;
  const paid = sumCents(parts.map((part) => part.amountCents));
  const sides = { stated: paid, found: earned, tolerance: cents(0) };
  const by = parts.map((part) => sayDate(part.on)).join(' and ');
  if (owedCents === 0) {
    const check = compareCents('incentivePaid', '', TITLE, sides, () => ({ cause: null, advice: null }));
    return [{ ...check, cause: by === '' ? null : `Paid by the receipt of ${by}, matched oldest first.` }];
  }
  const late = daysBetween(cycle.to, through) > LATE_DAYS;
  const part = paid === 0 ? '' : ` ${sayMoney(paid)} of it was paid, matched oldest first.`;
  if (late && cycles.some((later) => later.index > cycle.index && later.parts.length > 0)) {
    return [
      compareCents('incentivePaid', '', TITLE, sides, () => ({
        cause: `Later cycles were paid and this one was skipped.${part}`,
        advice: ASK,
      })),
    ];
  }
  return [
    nothing({
      stated: paid === 0 ? null : paid,
      found: earned,
      cause: `${sayMoney(owedCents)} earned to ${sayDay(cycle.to)} is not paid yet.${part}`,
      advice: late ? `It is more than half a year old. ${ASK}` : null,
    }),
  ];
}

function nothing(said: {
  about?: string;
  title?: string;
  stated?: Cents | null;
  found?: Cents | null;
  cause: string;
  advice?: string | null;
}): Check {
  const { about = '', title = TITLE, stated = null, found = null, cause, advice = null } = said;
  return nothingToCompare('incentivePaid', about, 'USD', {
    title,
    stated: stated === null ? null : dollarsText(stated),
    found: found === null ? null : dollarsText(found),
    cause,
    advice,
  });
}
