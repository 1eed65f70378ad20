import { describe, expect, it } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { owedOf } from '#shared/ledger/owed.ts';
import { billSentence } from '#shared/ledger/sentences.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';

/** The last of three bills has its energy priced at last year's price, 0.1500, with the franchise of 3.1 % worked out on it (`off`: cents beside that). */
function pricedAtLastYears(off = 0): HouseholdFacts {
  const facts = buildHousehold();
  const plans = facts.plans.map((one) => ({
    ...one,
    plan: {
      ...one.plan,
      charges: one.plan.charges.map((charge) =>
        charge.id === 'energy'
          ? { ...charge, rates: [{ from: day('2024-01-01'), rate: '0.1500' }, ...charge.rates] }
          : charge,
      ),
    },
  }));
  const last = facts.statements.length - 1;
  const statements = facts.statements.map((statement, at) => {
    if (at !== last) return statement;
    const amountOf = (component: string) =>
      statement.lines.find((line) => line.component === component)?.amountCents ?? cents(0);
    const energy = Math.floor((Number(statement.lines[0]?.quantity ?? 0) * 1500 + 50) / 100) + off;
    const franchise = Math.floor(((energy + amountOf('customer') + amountOf('benefits')) * 310 + 5000) / 10_000);
    const change = energy + franchise - amountOf('energy') - amountOf('franchise');
    const lines = statement.lines.map((line) => {
      if (line.component === 'energy') return { ...line, rate: '0.1500', amountCents: cents(energy) };
      return line.component === 'franchise' ? { ...line, amountCents: cents(franchise) } : line;
    });
    return { ...statement, lines, amountDueCents: cents(statement.amountDueCents + change) };
  });
  return { ...facts, plans, statements };
}

describe('a bill that differs', () => {
  it('names the mistake that, made alone, gives the billed cents', () => {
    const { cycles } = computeLedger(pricedAtLastYears(), { today: BUILT_TODAY });
    const cycle = cycles.at(-1);
    expect(cycle?.causes.map((cause) => cause.cause)).toEqual(['wrongRate']);
    expect(cycle?.causes[0]?.words).toMatch(/0\.1500.*0\.1684|0\.15\b.*0\.1684/);
    expect(cycle && billSentence(cycle)).toContain(cycle?.causes[0]?.words);
    const [row, ...more] = owedOf(cycles).rows;
    expect(more).toEqual([]);
    expect(row?.causes).toEqual([cycle?.causes[0]?.words]);
    expect(row?.amountCents).toBeLessThan(0);
  });

  it('names none where no single mistake gives the billed cents', () => {
    const { cycles } = computeLedger(pricedAtLastYears(7), { today: BUILT_TODAY });
    expect(cycles.at(-1)?.state).toBe('differs');
    expect(cycles.at(-1)?.causes).toEqual([]);
  });

  it('is not asked about where everything agrees', () => {
    const { cycles } = computeLedger(buildHousehold(), { today: BUILT_TODAY });
    expect(cycles.flatMap((cycle) => cycle.causes)).toEqual([]);
  });
});
