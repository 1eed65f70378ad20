import { describe, expect, test } from 'vitest';
import { findCauses } from '#shared/reconcile/causes/find-causes.ts';
import { settle } from '#shared/settlement/settle.ts';
import { cents } from '#shared/units/cents.ts';
import {
  billedCycle,
  fixtureInput,
  money,
  numbers,
  readErrorFixtures,
  shortByBank,
} from '#tests/support/error-fixtures.ts';
import { comparableExpected, comparableSettlement, taken } from '#tests/support/netmetering-adapter.ts';

/**
 * Source: this project's own error fixtures (net-metering.md §3), invented rates, each with one planted mistake out of the checks of §4; worked out
 * apart from the code under test. Everything is driven by what the file holds; its `cause` is only what the test expects to be found.
 */
const fixtures = readErrorFixtures();

test('the file holds error fixtures, and cycles in each', () => {
  expect(fixtures.length).toBeGreaterThan(0);
  for (const fixture of fixtures) expect(fixture.cycles.length).toBeGreaterThan(0);
});

describe.each(fixtures)('error fixture $id', (fixture) => {
  const input = fixtureInput(fixture);

  test('settled rightly, it comes to what the fixture expects', () => {
    const { settlements } = taken(
      settle(
        input.cycles[0]?.plan ?? never(),
        input.opening,
        input.cycles.map((one) => one.usage),
      ),
    );
    expect(settlements.map(comparableSettlement)).toEqual(
      fixture.cycles.map((one) => comparableExpected(one.expected)),
    );
  });

  test('exactly one mistake reproduces what was billed, with its cents and its bank', () => {
    const causes = findCauses(input);
    expect(causes.map((found) => found.cause)).toEqual([fixture.cause]);
    const [found] = causes;
    expect(found?.alsoWords).toEqual([]);
    expect(found?.overbilledCents).toBe(money(fixture.overbilled));
    expect(shortByBank(found?.bankShort ?? [])).toEqual(numbers(fixture.bankShort));
    expect(found?.words).toMatch(/^\S.*[^.]\.$/);
  });

  test('billed as expected, there is no cause', () => {
    const cycles = input.cycles.map((one, at) => ({
      ...one,
      billed: billedCycle(fixture.cycles[at]?.expected ?? never()),
    }));
    expect(findCauses({ ...input, cycles })).toEqual([]);
  });

  test('a cent off what the mistake comes to, there is no cause', () => {
    const last = input.cycles.length - 1;
    const cycles = input.cycles.map((one, at) => {
      const { amountDueCents } = one.billed;
      return at < last ? one : { ...one, billed: { ...one.billed, amountDueCents: cents((amountDueCents ?? 0) + 1) } };
    });
    expect(findCauses({ ...input, cycles })).toEqual([]);
  });
});

function never(): never {
  throw new Error('the fixture holds no such cycle');
}
