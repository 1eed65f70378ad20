import type { CreditFacts } from '../facts/finance.ts';
import { sayDate, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { type Day, yearOf } from '../units/day.ts';
import { creditCashOn, creditEntries, creditLinesOf } from './credit-entries.ts';
import { creditLaw } from './credit-rate.ts';
import { creditVintages } from './credit-vintages.ts';
import { rule, stated, usdInput, usdListInput } from './inputs.ts';

export { creditCashOn, creditEntries, creditLinesOf } from './credit-entries.ts';
export { creditRate } from './credit-rate.ts';
export { carryCredit, creditLine1 } from './form-5695.ts';

/** What is there to be used by a day: line 6b of all that is completed by then, and what a return before the record carried in once its year is over. */
export function creditEarnedBy(credit: CreditFacts, on: Day): Cents {
  const earned = creditVintages(credit, on)
    .filter((vintage) => vintage.state === 'counts')
    .map((vintage) => vintage.line6bCents);
  return sumCents([...earned, carriedInBy(credit, on)]);
}

function carriedInBy({ carriedIn }: CreditFacts, on: Day): Cents {
  return carriedIn !== null && yearOf(on) > carriedIn.taxYear ? carriedIn.amountCents : ZERO_CENTS;
}

/** Everything earned and carried in less everything received by a day. No one guarantees the part that is carried forward. */
export function creditStillToCome(credit: CreditFacts, on: Day): Figure {
  return stillToComeFigure(
    credit,
    creditEarnedBy(credit, on),
    creditEntries(credit, on).map((entry) => entry.amountCents),
  );
}

/** The same from what was received, as the book's own entries have it. */
export function stillToComeFigure(credit: CreditFacts, earned: Cents, received: readonly Cents[]): Figure {
  const total = sumCents(received);
  const placed = credit.placedInServiceOn;
  return {
    amountCents: cents(earned - total),
    working: {
      words: `${sayMoney(earned)} earned − ${sayMoney(total)} received`,
      formula: 'earned - sum(received)',
      inputs: [
        usdInput(
          'earned',
          earnedWords(credit),
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

/** "Line 6b, placed in service 22 May 2024"; the years where there are several, and what was carried in. */
function earnedWords(credit: CreditFacts): string {
  const { placedInServiceOn: placed, carriedIn } = credit;
  const years = creditVintages(credit)
    .filter((vintage) => vintage.state === 'counts')
    .map((vintage) => vintage.year);
  const own =
    years.length > 1
      ? [`Line 6b of ${years.join(' and ')}`]
      : years.length === 1 && placed !== null
        ? [`Line 6b, placed in service ${sayDate(placed)}`]
        : [];
  const before = carriedIn === null ? [] : [`line 16 of ${carriedIn.taxYear}`];
  return [...own, ...before].join(' and ') || 'Credit earned';
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
  let carried: number = carriedInBy(credit, on);
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
