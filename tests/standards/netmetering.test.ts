import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { settleCycle } from '#shared/settlement/settle.ts';
import { EMPTY_OPENING, type Settlement } from '#shared/settlement/settlement.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import {
  comparableExpected,
  comparableSettlement,
  readVectors,
  settleVector,
  taken,
  totalsOf,
  vectorUsage,
} from '#tests/support/netmetering-adapter.ts';

/**
 * Source: this project's own vectors of net-metered settlement, invented rates, worked out twice by independent computations; the form of rule
 * each is like is named in its `resembles` (state codes and commission rules, listed in the file). Everything is driven by what the file holds.
 */
const file = readVectors();

test('the file of vectors holds vectors, and cycles in each', () => {
  expect(file.vectors.length).toBeGreaterThan(0);
  expect(file.errorFixtures.length).toBeGreaterThan(0);
  for (const vector of [...file.vectors, ...file.errorFixtures]) expect(vector.cycles.length).toBeGreaterThan(0);
});

describe.each(file.vectors)('vector $id', (vector) => {
  const settlements = settleVector(vector);

  test('every line, bank and payout of every cycle comes out as expected', () => {
    expect(settlements.map(comparableSettlement)).toEqual(
      vector.cycles.map((cycle) => comparableExpected(cycle.expected)),
    );
  });

  test('the totals come out as expected', () => {
    const { currentCharges, payouts } = totalsOf(settlements);
    expect(Number(currentCharges)).toBe(Number(vector.totals.currentCharges));
    expect(Number(payouts)).toBe(Number(vector.totals.payouts));
  });

  test('every working evaluates to its own figure', () => {
    expect(countWorkings(settlements)).toBeGreaterThan(0);
  });
});

describe.each(file.errorFixtures)('error fixture $id, rightly settled', (fixture) => {
  const settlements = settleVector(fixture);

  test('every line, bank and payout comes out as expected', () => {
    expect(settlements.map(comparableSettlement)).toEqual(
      fixture.cycles.map((cycle) => comparableExpected(cycle.expected)),
    );
    expect(countWorkings(settlements)).toBeGreaterThan(0);
  });
});

describe('the interval micro case', () => {
  const { inputs, expected } = file.intervalMicroCase;

  test.each(Object.entries(expected))('netted by %s, import and export come out as expected', (netting, flow) => {
    const plan = taken(
      parsePlan({
        timeZone: 'America/Denver',
        netting,
        charges: [
          {
            id: 'energy',
            label: 'Energy',
            kind: 'import',
            basis: 'import',
            rates: [{ from: '2025-01-01', rate: '1' }],
          },
        ],
        credits: [
          {
            id: 'sent',
            label: 'Export',
            kind: 'export',
            basis: 'export',
            rates: [{ from: '2025-01-01', rate: '1' }],
            to: 'bill',
          },
        ],
      }),
    );
    const { lines } = taken(settleCycle(plan, EMPTY_OPENING, vectorUsage(inputs))).settlement;
    expect(lines.map((line) => Number(line.quantity))).toEqual([Number(flow.import), Number(flow.export)]);
  });
});

/** Evaluates every working of the settlements against its line or payout, and says how many there were. */
function countWorkings(settlements: readonly Settlement[]): number {
  let count = 0;
  for (const settlement of settlements) {
    for (const figure of [...settlement.lines, ...settlement.payouts]) {
      expect(evaluateWorking(figure.working).minus(usdOf(figure.amountCents)).toString(), figure.working.formula).toBe(
        '0',
      );
      count += 1;
    }
  }
  return count;
}
