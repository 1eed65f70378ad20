import type { CreditFacts } from '../facts/finance.ts';
import { sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import type { Source } from '../working.ts';
import { creditLinesOf } from './credit-entries.ts';
import { creditVintages } from './credit-vintages.ts';
import { rule, stated, usdInput, usdListInput } from './inputs.ts';

/**
 * By how much the roof raises the home's basis: cost less what was excluded from income (26 U.S.C. 136(b)) less the credit allowed
 * (26 U.S.C. 25D(f)). Whether a credit that is carried forward lowers it as it is used or all at once was not found, so both are shown. A dealer fee
 * and other costs left out are not counted; whether they are part of the basis is for the preparer.
 */
export type BasisEffect = {
  /** With the credit used on filed returns so far. */
  soFar: Figure;
  /** With all of the credit. */
  whole: Figure;
};

/** Null where nothing earns a credit, or where an earlier return used a part of it that this record does not know. */
export function basisEffect(credit: CreditFacts): BasisEffect | null {
  const vintages = creditVintages(credit).filter((vintage) => vintage.state === 'counts');
  if (vintages.length === 0 || credit.carriedIn !== null) return null;
  const cost = sumCents(vintages.map((vintage) => vintage.grossCents));
  const taken = sumCents(vintages.map((vintage) => vintage.reductionCents));
  const filed = new Set(credit.years.filter((year) => year.status !== 'planned').map((year) => year.taxYear));
  const lines = creditLinesOf(credit);
  const used = lines.filter((line) => filed.has(line.taxYear)).map((line) => line.line15Cents ?? cents(0));
  const earned = lines.map((line) => line.line6bCents);
  return {
    soFar: figure(cost, taken, used, 'Line 15 of the returns filed', stated('Tax credit used')),
    whole: figure(cost, taken, earned, 'Line 6b of each year', rule('Form 5695, Part I', 'line 6b')),
  };
}

function figure(cost: Cents, taken: Cents, allowed: readonly Cents[], label: string, source: Source): Figure {
  const credit = sumCents(allowed);
  return {
    amountCents: cents(cost - taken - credit),
    working: {
      words: `${sayMoney(cost)} of cost − ${sayMoney(taken)} taken off − ${sayMoney(credit)} of credit (26 U.S.C. 25D(f))`,
      formula: 'cost - taken - sum(credit)',
      inputs: [
        usdInput('cost', 'Qualified cost', cost, stated('Costs as entered')),
        usdInput('taken', 'Subsidies and rebates taken off', taken, stated('Costs as entered')),
        usdListInput('credit', label, allowed, source),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
