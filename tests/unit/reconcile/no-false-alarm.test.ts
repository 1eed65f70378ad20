import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type AssembledCycle, assembleCycles } from '#shared/ledger/cycles.ts';
import { cents } from '#shared/units/cents.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { intervalPlans, wholeCyclePlans } from '#tests/unit/settlement/arbitrary-plan.ts';
import { metered, type Places, printedHousehold, settledHouse } from './printed-house.ts';

const places = fc.constantFrom<Places[]>(null, 2, 0);

/** Checks that differ, as short texts; and why a cycle was not settled. */
function alarms(cycles: readonly AssembledCycle[]): string[] {
  return cycles.flatMap(({ cycle }) => [
    ...(cycle.whyNotSettled === null ? [] : [cycle.whyNotSettled]),
    ...cycle.checks
      .filter((one) => one.verdict === 'differs')
      .map((one) => `${one.key} ${one.difference} ${one.cause}`),
  ]);
}

describe('a statement printed from our own settlement, its kWh in full or rounded, agrees in every check', () => {
  test('on any plan that needs no interval data', () => {
    fc.assert(
      fc.property(wholeCyclePlans, metered, places, (plan, cycles, digits) => {
        const { cycles: made } = assembleCycles(printedHousehold(settledHouse(plan, cycles, null), digits));
        expect(made).toHaveLength(cycles.length);
        expect(alarms(made)).toEqual([]);
        // Something was compared: the amount, the import and the account.
        for (const key of ['amountDue:', 'importAgainstIntervals:', 'linesAddUp:'])
          expect(made.at(-1)?.cycle.checks.find((one) => one.key === key)?.verdict).toBe('agrees');
      }),
      { numRuns: PROPERTY_RUNS },
    );
  }, 120_000);

  test('on any plan settled by quarter-hours (a tenth of the runs: each holds a quarter of a year of them)', () => {
    fc.assert(
      fc.property(intervalPlans, metered, places, fc.nat(), (plan, cycles, digits, seed) => {
        const { cycles: made } = assembleCycles(printedHousehold(settledHouse(plan, cycles, seed), digits));
        expect(alarms(made)).toEqual([]);
        expect(made.at(-1)?.cycle.checks.find((one) => one.key === 'amountDue:')?.verdict).toBe('agrees');
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 10) },
    );
  }, 120_000);
});

describe('a wrong line', () => {
  test('differs in its cycle; corrected by a revision of the statement, every check is as if it had never been', () => {
    fc.assert(
      fc.property(wholeCyclePlans, metered, fc.nat(), fc.integer({ min: 100, max: 9999 }), (plan, drawn, at, more) => {
        const right = printedHousehold(settledHouse(plan, drawn, null), null);
        const index = at % right.statements.length;
        const wrong = right.statements.map((one, place) => {
          if (place !== index) return one;
          const [first, ...others] = one.lines;
          if (!first) throw new Error('a statement without lines');
          const inDue = { ...first, inDue: true, amountCents: cents(first.amountCents + more) };
          return { ...one, lines: [inDue, ...others], amountDueCents: cents(one.amountDueCents + more) };
        });
        const before = assembleCycles({ ...right, statements: wrong }).cycles;
        expect(before[index]?.cycle.state).toBe('differs');
        const corrected = right.statements.flatMap((one, place) =>
          place === index ? [{ ...one, revision: 2, reason: 'Rebilled', enteredAt: '2026-11-01T08:00:00Z' }] : [],
        );
        const after = assembleCycles({ ...right, statements: [...wrong, ...corrected] }).cycles;
        expect(alarms(after)).toEqual([]);
        expect(after.map(({ cycle }) => cycle.checks)).toEqual(
          assembleCycles(right).cycles.map(({ cycle }) => cycle.checks),
        );
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 4) },
    );
  }, 120_000);
});
