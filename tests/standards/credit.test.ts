import { describe, expect, it } from 'vitest';
import { basisEffect } from '#shared/books/credit-basis.ts';
import type { CreditLines } from '#shared/books/credit-lines.ts';
import { carryCredit, creditLine1, creditLinesOf, creditRate } from '#shared/books/tax-credit.ts';
import type { CreditCost, CreditFacts } from '#shared/facts/finance.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { readVectors } from './vectors.ts';

/**
 * `credit_vectors.json`: IRS Form 5695, Part I (residential clean energy credit, solar electric only), lines 1, 6a, 6b and 12–16, in whole dollars, on
 * invented figures; the rate by the year placed in service, 26 U.S.C. 25D(g). `cost` is line 1 after reductions, `limit` line 14.
 */
type CreditVector = {
  id: string;
  title: string;
  carryIn: number;
  years: {
    taxYear: number;
    facts: { cost?: number; limit: number };
    expected: Record<'line1' | 'line6a' | 'line6b' | 'line12' | 'line13' | 'line14' | 'line15' | 'line16', number>;
  }[];
  /** What line 1 rests on, where the vector says: gross cost, a utility's subsidy, the home's share, the day of completion, a dealer fee in the loan. */
  facts?: {
    grossCost?: number;
    utilitySubsidy?: number;
    nonbusinessShare?: string;
    completed?: string;
    loanPrincipal?: number;
    dealerFee?: number;
    homeBasisIncrease?: number;
    worksheet?: { form1040Line18: number; otherCredits: number };
  };
};

const vectors = readVectors<CreditVector>('credit_vectors.json');
const each = (kept: (vector: CreditVector) => boolean) =>
  vectors.filter(kept).map((vector) => [`${vector.id} ${vector.title}`, vector] as const);

describe('The credit goes through Form 5695 as its lines say', () => {
  it('has vectors to check', () => {
    expect(vectors.length).toBeGreaterThan(0);
  });

  it.each(each(() => true))('lines from line 1 and the limit: %s', (_name, vector) => {
    const lines = carryCredit(
      usd(vector.carryIn),
      vector.years.map(({ taxYear, facts }) => ({
        taxYear,
        line1Cents: usd(facts.cost ?? 0),
        rate: facts.cost ? creditRate(taxYear) : null,
        limitCents: usd(facts.limit),
      })),
    );
    expect(lines.map(inDollars)).toEqual(vector.years.map((year) => year.expected));
  });

  it.each(each((vector) => vector.carryIn === 0))('lines from the costs the owner enters: %s', (_name, vector) => {
    const lines = creditLinesOf(creditOf(vector));
    expect(lines.map(inDollars)).toEqual(vector.years.map((year) => year.expected));
  });

  it.each(each((vector) => vector.facts?.worksheet !== undefined))(
    'the limit typed is the worksheet’s: %s',
    (_n, v) => {
      const worksheet = v.facts?.worksheet;
      expect((worksheet?.form1040Line18 ?? 0) - (worksheet?.otherCredits ?? 0)).toBe(v.years[0]?.facts.limit);
    },
  );

  it.each(each((vector) => vector.facts?.homeBasisIncrease !== undefined))(
    'the home’s basis rises by cost less subsidy less credit allowed (26 U.S.C. 25D(f), 136(b)): %s',
    (_name, vector) => {
      expect(basisEffect(creditOf(vector))?.whole.amountCents).toBe(usd(vector.facts?.homeBasisIncrease ?? 0));
    },
  );

  it('leaves the cost alone for a state rebate that is income (DOE Homeowner’s Guide, as quoted: 18,000 × 0.30 = 5,400)', () => {
    const line1Cents = creditLine1([cost('qualified', 18_000), cost('leftOut', 1_000)], '1');
    const [line] = carryCredit(cents(0), [{ taxYear: 2023, line1Cents, rate: creditRate(2023), limitCents: null }]);
    expect(line?.line6bCents).toBe(540_000);
  });

  it('takes a utility subsidy off the cost before the rate (DOE Homeowner’s Guide example, from memory: (18,000 − 1,000) × 0.30 = 5,100)', () => {
    expect(creditLine1([cost('qualified', 18_000), cost('reduction', 1_000)], '1')).toBe(1_700_000);
    const [line] = carryCredit(cents(0), [
      { taxYear: 2023, line1Cents: cents(1_700_000), rate: creditRate(2023), limitCents: cents(1_000_000) },
    ]);
    expect(line?.line6bCents).toBe(510_000);
  });

  it('earns $9,000 on $30,000 (CRS Insight IN12611, its own example)', () => {
    const [line] = carryCredit(cents(0), [
      { taxYear: 2025, line1Cents: cents(3_000_000), rate: creditRate(2025), limitCents: null },
    ]);
    expect(line?.line6bCents).toBe(900_000);
  });

  it('has the rate of each year placed in service (26 U.S.C. 25D(g); P.L. 119-21 §70506 from 2026 on)', () => {
    expect([2005, 2006, 2008, 2009, 2019, 2020, 2021, 2022, 2025, 2026].map(creditRate)).toEqual([
      '0',
      '0.30',
      '0.30',
      '0.30',
      '0.30',
      '0.26',
      '0.26',
      '0.30',
      '0.30',
      '0',
    ]);
  });
});

/** The vector as an owner would enter it. Without a breakdown the stated cost stands as one qualified line. */
function creditOf(vector: CreditVector): CreditFacts {
  const { facts } = vector;
  const costYear = vector.years.find((year) => year.facts.cost !== undefined) ?? vector.years[0];
  if (!costYear) throw new Error('a vector without years');
  const costs: CreditCost[] = [];
  if (facts?.grossCost !== undefined) {
    costs.push(cost('qualified', facts.grossCost));
    if (facts.utilitySubsidy !== undefined) costs.push(cost('reduction', facts.utilitySubsidy));
  } else if (facts?.loanPrincipal !== undefined) {
    const fee = facts.dealerFee ?? 0;
    costs.push(cost('qualified', facts.loanPrincipal - fee), cost('leftOut', fee));
  } else {
    costs.push(cost('qualified', costYear.facts.cost ?? 0));
  }
  return {
    placedInServiceOn: day(facts?.completed ?? `${costYear.taxYear}-07-01`),
    costs,
    homeShare: facts?.nonbusinessShare ?? '1',
    years: vector.years.map(({ taxYear, facts: { limit } }) => ({
      taxYear,
      limitCents: usd(limit),
      status: 'filed',
      filedOn: day(`${taxYear + 1}-04-15`),
      refundOn: null,
      asRefund: false,
      typedBy: null,
      limitFrom: null,
      documentId: null,
    })),
    carriedIn: null,
  };
}

function cost(treatment: CreditCost['treatment'], dollars: number): CreditCost {
  return {
    id: treatment,
    label: treatment,
    amountCents: usd(dollars),
    treatment,
    reason: null,
    placedInServiceOn: null,
    documentId: null,
  };
}

function inDollars(line: CreditLines) {
  const dollars = (amount: Cents | null) => (amount === null ? null : amount / 100);
  return {
    line1: dollars(line.line1Cents),
    line6a: dollars(line.line6aCents),
    line6b: dollars(line.line6bCents),
    line12: dollars(line.line12Cents),
    line13: dollars(line.line13Cents),
    line14: dollars(line.line14Cents),
    line15: dollars(line.line15Cents),
    line16: dollars(line.line16Cents),
  };
}

function usd(dollars: number): Cents {
  return cents(Math.round(dollars * 100));
}
