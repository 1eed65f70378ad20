import type { CreditFacts, CreditYear } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents, ZERO_CENTS } from '../units/cents.ts';
import { type Day, yearOf } from '../units/day.ts';
import type { UnplacedEntry } from './book.ts';
import type { CreditLines } from './credit-lines.ts';
import { creditLaw, creditRate } from './credit-rate.ts';
import { carryCredit, creditLine1 } from './form-5695.ts';
import { rule, stated, usdInput, usdListInput } from './inputs.ts';

export { creditRate } from './credit-rate.ts';
export { carryCredit, creditLine1 } from './form-5695.ts';

const lines = new WeakMap<CreditFacts, CreditLines[]>();

/**
 * The form's lines for each year the owner lists, and for the year the roof was placed in service if the law gives that year a credit. Cost enters in
 * that year alone: one completed after 2025 earns nothing, whenever it was paid.
 */
export function creditLinesOf(credit: CreditFacts): CreditLines[] {
  const known = lines.get(credit);
  if (known) return known;
  const placed = credit.placedInServiceOn === null ? null : yearOf(credit.placedInServiceOn);
  const rate = placed === null ? '0' : creditRate(placed);
  const earns = placed !== null && rate !== '0';
  const byYear = new Map(credit.years.map((year) => [year.taxYear, year.limitCents]));
  if (earns && !byYear.has(placed)) byYear.set(placed, null);
  const made = carryCredit(
    ZERO_CENTS,
    [...byYear].map(([taxYear, limitCents]) => {
      const enters = earns && taxYear === placed;
      return {
        taxYear,
        line1Cents: enters ? creditLine1(credit.costs, credit.homeShare) : ZERO_CENTS,
        rate: enters ? rate : null,
        limitCents,
      };
    }),
  );
  lines.set(credit, made);
  return made;
}

/** The day a return's use of the credit counts as cash: the refund's, or the filing's where it only lowered the tax due. Null until then. */
export function creditCashOn(year: CreditYear): Day | null {
  if (year.status === 'planned') return null;
  return year.asRefund ? year.refundOn : year.filedOn;
}

/** Cash entries through a day: line 15 of each return whose money has come. A planned year gives none. */
export function creditEntries(credit: CreditFacts, through: Day): UnplacedEntry[] {
  const entries: UnplacedEntry[] = [];
  for (const line of creditLinesOf(credit)) {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    const on = year ? creditCashOn(year) : null;
    const { line13Cents, line14Cents, line15Cents } = line;
    if (!year || on === null || on > through) continue;
    if (line13Cents === null || line14Cents === null || line15Cents === null || line15Cents === 0) continue;
    const form = rule('Form 5695, Part I', String(line.taxYear));
    entries.push({
      id: `credit-${line.taxYear}`,
      date: on,
      book: 'credit',
      kind: year.asRefund ? 'refund' : 'lessTax',
      label: `Tax credit used on the ${line.taxYear} return${year.asRefund ? ', refunded' : ''}`,
      amountCents: line15Cents,
      basis: 'cash',
      estimated: false,
      working: {
        words: `Line 15 of ${line.taxYear}: the smaller of ${sayMoney(line13Cents)} and the limit ${sayMoney(line14Cents)}`,
        formula: 'min(available, limit)',
        inputs: [
          usdInput('available', 'Line 13', line13Cents, form),
          usdInput('limit', 'Line 14, from the return', line14Cents, limitSource(year)),
        ],
        unit: 'USD',
        basis: 'computed',
      },
    });
  }
  return entries;
}

function limitSource(year: CreditYear) {
  return stated(year.typedBy === null ? 'Limit as entered' : `Limit as entered by ${year.typedBy}`);
}

/** What the roof earned by a day: line 6b once it is placed in service. */
export function creditEarnedBy(credit: CreditFacts, on: Day): Cents {
  if (credit.placedInServiceOn === null || credit.placedInServiceOn > on) return ZERO_CENTS;
  return cents(creditLinesOf(credit).reduce((sum, line) => sum + line.line6bCents, 0));
}

/** Everything earned less everything received by a day. No one guarantees the part that is carried forward. */
export function creditStillToCome(credit: CreditFacts, on: Day): Figure {
  return stillToComeFigure(
    credit,
    creditEarnedBy(credit, on),
    creditEntries(credit, on).map((entry) => entry.amountCents),
  );
}

/** The same from what was received, as the book's own entries have it. */
export function stillToComeFigure(credit: CreditFacts, earned: Cents, received: readonly Cents[]): Figure {
  const total = received.reduce((sum, amount) => sum + amount, 0);
  const placed = credit.placedInServiceOn;
  return {
    amountCents: cents(earned - total),
    working: {
      words: `${sayMoney(earned)} earned − ${sayMoney(cents(total))} received`,
      formula: 'earned - sum(received)',
      inputs: [
        usdInput(
          'earned',
          placed === null ? 'Credit earned' : `Line 6b, placed in service ${sayDate(placed)}`,
          earned,
          placed === null ? stated('Tax credit as entered') : rule('26 U.S.C. 25D', creditLaw(yearOf(placed))),
        ),
        usdListInput('received', `Received in ${received.length} parts`, received, stated('Tax credit received')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

export type CreditParts = {
  /** Not on any return filed by the day. */
  notYetFiledCents: Cents;
  /** Used on a filed return whose money has not come. */
  awaitedCents: Cents;
  /** Line 16 of the last filed return: unused, not guaranteed. */
  carriedForwardCents: Cents;
};

/** Splits what is still to come; the three parts add up to it. */
export function creditParts(credit: CreditFacts, on: Day): CreditParts {
  const total = creditStillToCome(credit, on).amountCents;
  let awaited = 0;
  let carried = 0;
  for (const line of creditLinesOf(credit)) {
    const year = credit.years.find((one) => one.taxYear === line.taxYear);
    const filed = year !== undefined && year.status !== 'planned' && (year.filedOn === null || year.filedOn <= on);
    if (!filed || line.line15Cents === null || line.line16Cents === null) continue;
    const cashOn = creditCashOn(year);
    if (cashOn === null || cashOn > on) awaited += line.line15Cents;
    carried = line.line16Cents;
  }
  const awaitedCents = cents(Math.min(awaited, Math.max(0, total)));
  const carriedForwardCents = cents(Math.min(carried, Math.max(0, total - awaitedCents)));
  return {
    notYetFiledCents: cents(total - awaitedCents - carriedForwardCents),
    awaitedCents,
    carriedForwardCents,
  };
}
