import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { incentiveLeft } from '#shared/books/incentive-left.ts';
import { matchIncentive } from '#shared/books/incentive-match.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, addMonths, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';

const START = day('2025-01-14');

/** Monthly cycles that earned so many cents each. */
function earned(...amounts: number[]) {
  return amounts.map((amount, at) => ({
    from: addMonths(START, at),
    to: addMonths(START, at + 1),
    earnedCents: cents(amount),
  }));
}

function receipt(id: string, on: string, amount: number, from: string | null = null, to: string | null = null) {
  return {
    id,
    on: day(on),
    amountCents: cents(amount),
    from: from === null ? null : day(from),
    to: to === null ? null : day(to),
  };
}

const owed = (match: ReturnType<typeof matchIncentive>) => match.cycles.map((cycle) => cycle.owedCents);

describe('which receipt pays which cycle', () => {
  test('without days of their own, receipts pay the oldest earned first, in the order they came', () => {
    const match = matchIncentive(earned(300, 400, 500), [
      receipt('b', '2025-06-01', 450),
      receipt('a', '2025-05-01', 350),
    ]);
    expect(owed(match)).toEqual([0, 0, 400]);
    expect(match.receipts.map((one) => [one.id, one.parts.map((part) => [part.cycle, part.amountCents])])).toEqual([
      [
        'a',
        [
          ['2025-02-14', 300],
          ['2025-03-14', 50],
        ],
      ],
      [
        'b',
        [
          ['2025-03-14', 350],
          ['2025-04-14', 100],
        ],
      ],
    ]);
    expect(match.cycles.flatMap((cycle) => cycle.parts).every((part) => !part.stated)).toBe(true);
  });

  test('two receipts of one day go by their id, and the order they are given in does not matter', () => {
    const two = [receipt('b', '2025-05-01', 100), receipt('a', '2025-05-01', 200)];
    expect(matchIncentive(earned(300), two)).toEqual(matchIncentive(earned(300), two.toReversed()));
  });

  test('a receipt that says its days pays them before anything is matched, and no others', () => {
    const match = matchIncentive(earned(300, 400, 500), [
      receipt('old', '2025-04-01', 350),
      receipt('march', '2025-05-01', 450, '2025-02-14', '2025-03-14'),
    ]);
    // 400 of 450 pay March; 50 pay nothing. The other pays 300 and, March being paid, 50 of April.
    expect(owed(match)).toEqual([0, 0, 450]);
    expect(match.receipts.map((one) => one.unmatchedCents)).toEqual([0, 50]);
    expect(match.unmatchedCents).toBe(50);
  });

  test('days that are one off the reads are the reads', () => {
    const match = matchIncentive(earned(300, 400), [receipt('a', '2025-05-01', 300, '2025-01-13', '2025-02-15')]);
    expect(match.receipts[0]?.cover).toEqual({ from: '2025-01-14', to: '2025-02-14' });
    expect(owed(match)).toEqual([0, 400]);
  });

  test('days inside a cycle stay as they are, and the cycle they touch is paid', () => {
    const match = matchIncentive(earned(300, 400), [receipt('a', '2025-05-01', 350, '2025-01-20', '2025-03-01')]);
    expect(match.receipts[0]?.cover).toEqual({ from: '2025-01-20', to: '2025-03-01' });
    expect(owed(match)).toEqual([0, 350]);
  });

  test('more than was earned is left unmatched; a correction downwards matches nothing', () => {
    const match = matchIncentive(earned(300), [receipt('a', '2025-05-01', 500), receipt('back', '2025-06-01', -40)]);
    expect(match.receipts.map((one) => one.unmatchedCents)).toEqual([200, -40]);
    expect(match.unmatchedCents).toBe(160);
  });

  test('a programme that charges is matched with its sign turned round', () => {
    const match = matchIncentive(earned(-300, -400), [receipt('a', '2025-05-01', -500)]);
    expect(owed(match)).toEqual([0, -200]);
    expect(match.receipts[0]?.parts.map((part) => part.amountCents)).toEqual([-300, -200]);
  });

  const receipts = fc.array(
    fc.record({ amount: fc.integer({ min: -500, max: 4000 }), day: fc.nat(700), first: fc.nat(14), cycles: fc.nat(4) }),
    { maxLength: 12 },
  );
  const made = (rows: { amount: number; day: number; first: number; cycles: number }[]) =>
    rows.map((row, at) => ({
      id: `r${at}`,
      on: addDays(START, row.day),
      amountCents: cents(row.amount),
      from: row.cycles === 0 ? null : addMonths(START, row.first),
      to: row.cycles === 0 ? null : addMonths(START, row.first + row.cycles),
    }));
  const amounts = fc.array(fc.integer({ min: 0, max: 3000 }), { maxLength: 14 });
  const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

  test('what is matched and what is not add up to what was received; what is owed, to earned less matched', () => {
    fc.assert(
      fc.property(amounts, receipts, fc.constantFrom(1, -1), (cycles, rows, sign) => {
        const own = earned(...cycles.map((amount) => sign * amount));
        const came = made(rows.map((row) => ({ ...row, amount: sign * row.amount })));
        const match = matchIncentive(own, came);
        const received = sum(came.map((one) => one.amountCents));
        const matched = sum(match.receipts.flatMap((one) => one.parts.map((part) => part.amountCents)));
        expect(matched + match.unmatchedCents).toBe(received);
        for (const one of match.receipts) {
          expect(sum(one.parts.map((part) => part.amountCents)) + one.unmatchedCents).toBe(one.amountCents);
        }
        for (const one of match.cycles) {
          expect(sum(one.parts.map((part) => part.amountCents)) + one.owedCents).toBe(one.earnedCents);
        }
        expect(sum(match.cycles.flatMap((one) => one.parts.map((part) => part.amountCents)))).toBe(matched);
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });

  test('receipts without days that come to no more than was earned leave just the rest owed', () => {
    fc.assert(
      fc.property(amounts, receipts, (cycles, rows) => {
        const own = earned(...cycles);
        const all = made(rows.map((row) => ({ ...row, cycles: 0, amount: Math.max(0, row.amount) })));
        const total = sum(cycles);
        const came = all.filter((_, at) => sum(all.slice(0, at + 1).map((one) => one.amountCents)) <= total);
        const match = matchIncentive(own, came);
        expect(match.unmatchedCents).toBe(0);
        expect(sum(owed(match))).toBe(total - sum(came.map((one) => one.amountCents)));
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });
});

describe('what is left of the term', () => {
  const terms = {
    payer: '',
    ratePerKwh: '0.045',
    firstDay: day('2024-08-14'),
    lastDay: day('2032-08-13'),
    paidAs: 'separate' as const,
    received: [],
  };
  const EVEN = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31].map((days) => wh(days * 1_000_000));
  const estimate = { monthlyWh: EVEN, switchOn: day('2024-08-14'), degradation: '0' };

  test('is its months, and the expected kWh at the rate, called an estimate', () => {
    const left = incentiveLeft(terms, estimate, day('2032-07-15'));
    expect([left?.months, left?.lastDay, left?.expectedWh]).toEqual([2, '2032-08-13', 30_000_000]);
    expect(left?.figure?.amountCents).toBe(135_000);
    expect(left?.figure?.working.basis).toBe('estimated');
    const worked = left?.figure ? evaluateWorking(left.figure.working).toString() : '';
    expect(worked).toBe('1350');
  });

  test('counts from the first day of a term to come, and the last day still counts', () => {
    expect(incentiveLeft(terms, null, day('2024-01-01'))?.months).toBe(97);
    expect(incentiveLeft(terms, estimate, day('2032-08-13'))?.expectedWh).toBe(1_000_000);
    expect(incentiveLeft(terms, estimate, day('2032-08-14'))).toBeNull();
  });

  test('has no figure without an estimate of the production', () => {
    expect(incentiveLeft(terms, null, day('2026-11-02'))?.figure).toBeNull();
  });
});
