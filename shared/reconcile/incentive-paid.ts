import { incentiveFor } from '../books/incentive.ts';
import { sayDate, sayDay, sayKwh, sayMoney } from '../ledger/say.ts';
import { type Cents, cents, dollarsText, negateCents, sumCents } from '../units/cents.ts';
import { daysBetween } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { isIncentiveInBill } from './electric-lines.ts';
import { guessWords, incentiveGuesses, type Made } from './incentive-guess.ts';
import { compareCents, type Difference, nothingToCompare } from './make-check.ts';
import { cycleOfEnd, type Programme, type ProgrammeCycle, spanOf } from './programme.ts';
import { totalToleranceCents } from './tolerance.ts';

/** Half a year: payers settle by month, quarter or half-year, so that money earned longer ago is late (common practice, no source). */
const LATE_DAYS = 183;
const TITLE = 'Incentive, paid against earned';
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
  return covers.length > 0 ? covers : apart(programme, cycle, paper.index);
}

function inBill({ paper, settled, ...context }: CheckContext, programme: Programme, cycle: ProgrammeCycle): Check[] {
  const lines = paper.lines.filter((line) => isIncentiveInBill(line, programme.terms));
  if (lines.some((line) => settled.components[paper.lines.indexOf(line)] != null)) return [];
  const earned = cycle.earnedCents;
  if (cycle.eligible === 0 && lines.length === 0) return [];
  if (earned === null || lines.length === 0) {
    return [
      nothingToCompare('incentivePaid', '', 'USD', {
        title: TITLE,
        found: earned === null ? null : dollarsText(earned),
        cause:
          earned === null
            ? 'The production of this cycle is not completely known.'
            : 'The statement has no line for the incentive.',
        advice: earned === null || earned === 0 ? null : `${sayMoney(earned)} was earned. ${ASK}`,
      }),
    ];
  }
  const stated = negateCents(sumCents(lines.map((line) => line.amountCents)));
  const span = spanOf(programme, context.index, cycle.from, cycle.to);
  const made = typeof span === 'string' ? null : span;
  return [paidCheck({ ...context, paper, settled }, programme, '', TITLE, stated, { earned, made })];
}

/** The receipts whose days end in this cycle. */
function coverChecks(context: CheckContext, programme: Programme): Check[] {
  const { paper, index } = context;
  return programme.match.receipts.flatMap(({ id, on, amountCents, cover }) => {
    if (cover === null || cycleOfEnd(programme, cover.to) !== paper.index) return [];
    const title = `${TITLE}, receipt of ${sayDate(on)}`;
    const span = spanOf(programme, index, cover.from, cover.to);
    if (typeof span === 'string') {
      return [nothingToCompare('incentivePaid', id, 'USD', { title, stated: dollarsText(amountCents), cause: span })];
    }
    return [paidCheck(context, programme, id, title, amountCents, { earned: span.earnedCents, made: span })];
  });
}

function paidCheck(
  context: CheckContext,
  programme: Programme,
  about: string,
  title: string,
  stated: Cents,
  { earned, made }: { earned: Cents; made: Made | null },
): Check {
  const tolerance = cents(totalToleranceCents(made?.cycles.length ?? 1));
  return compareCents('incentivePaid', about, title, { stated, found: earned, tolerance }, () =>
    paidTexts(context, programme, stated, earned, made),
  );
}

function paidTexts(
  context: CheckContext,
  { terms }: Programme,
  stated: Cents,
  earned: Cents,
  made: Made | null,
): Difference {
  const gap = cents(Math.abs(stated - earned));
  const size = `${sayMoney(gap)} ${stated < earned ? 'less' : 'more'} than ${sayMoney(earned)} earned${made === null ? '' : ` on ${sayKwh(made.eligibleWh)} kWh`}.`;
  const same =
    made === null
      ? []
      : incentiveGuesses(context, made).filter((guess) => incentiveFor(terms, guess.wh, 1, 1) === stated);
  const words = guessWords(same);
  return { cause: words === null ? size : `${size} ${words}`, advice: ASK };
}

/** A cycle in which no stated cover ends: which receipt settles it, or what is still owed. */
function apart(programme: Programme, cycle: ProgrammeCycle, at: number): Check[] {
  if (cycle.eligible === 0) return [];
  const { match, through } = programme;
  const own = match.cycles[at];
  const earned = cycle.earnedCents;
  const cover = match.receipts.find(
    (receipt) => receipt.cover !== null && receipt.cover.from < cycle.to && receipt.cover.to > cycle.from,
  );
  const said = (cause: string, advice: string | null = null, stated: Cents | null = null) => [
    nothingToCompare('incentivePaid', '', 'USD', {
      title: TITLE,
      stated: stated === null ? null : dollarsText(stated),
      found: earned === null ? null : dollarsText(earned),
      cause,
      advice,
    }),
  ];
  if (cover?.cover) {
    const end = cycleOfEnd(programme, cover.cover.to);
    const checked = end === null ? null : (programme.cycles[end]?.to ?? null);
    return said(
      checked === null
        ? `The receipt of ${sayDate(cover.on)} covers this cycle and days that are on no statement yet.`
        : `The receipt of ${sayDate(cover.on)} covers this cycle; it is compared in the cycle to ${sayDate(checked)}.`,
    );
  }
  if (earned === null || own === undefined) return said('The production of this cycle is not completely known.');
  const paid = sumCents(own.parts.map((part) => part.amountCents));
  const last = own.parts.at(-1);
  if (own.owedCents === 0 && last !== undefined) {
    const sides = { stated: paid, found: earned, tolerance: cents(0) };
    const check = compareCents('incentivePaid', '', TITLE, sides, () => ({ cause: null, advice: null }));
    return [{ ...check, cause: `Paid by the receipt of ${sayDate(last.on)}, matched oldest first.` }];
  }
  const late = daysBetween(cycle.to, through) > LATE_DAYS;
  const laterPaid = match.cycles.slice(at + 1).some((later) => later.parts.length > 0);
  const part = paid === 0 ? '' : ` ${sayMoney(paid)} of it was paid, matched oldest first.`;
  if (late && laterPaid) {
    const sides = { stated: paid, found: earned, tolerance: cents(1) };
    return [
      compareCents('incentivePaid', '', TITLE, sides, () => ({
        cause: `Later cycles were paid and this one was skipped.${part}`,
        advice: ASK,
      })),
    ];
  }
  return said(
    `${sayMoney(own.owedCents)} earned to ${sayDay(cycle.to)} is not paid yet.${part}`,
    late ? `It is more than half a year old. ${ASK}` : null,
    last === undefined ? null : paid,
  );
}
