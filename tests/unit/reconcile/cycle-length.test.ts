import { describe, expect, test } from 'vitest';
import { addDays, day, daysBetween } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { changed, check } from './built-checks.ts';

/** The second cycle, ended after so many days; the reads and the printed days go with it. */
function lasting(days: number) {
  return changed(1, (statement) => {
    const to = addDays(statement.from, days);
    return { ...statement, to, printedDays: days, reads: statement.reads.map((read) => ({ ...read, to })) };
  });
}

describe('the length of a cycle', () => {
  test.each([27, 30, 35])('of %i days is usual', (days) => {
    const found = check(lasting(days), 1, 'daysInRange:');
    expect([found.verdict, found.stated, found.difference]).toEqual(['agrees', String(days), '0']);
  });

  test.each([
    [26, '27', '-1', /^A short cycle of 26 days/],
    [36, '35', '1', /^A long cycle of 36 days/],
  ])('of %i days differs by what it lacks or has over', (days, usual, difference, cause) => {
    const found = check(lasting(days), 1, 'daysInRange:');
    expect([found.verdict, found.found, found.difference]).toEqual(['differs', usual, difference]);
    expect(found.cause).toMatch(cause);
  });

  test('is nothing to compare on the first statement', () => {
    const found = check(buildHousehold(), 0, 'daysInRange:');
    expect([found.verdict, found.stated]).toEqual(['nothing-to-compare', '30']);
  });

  test('is nothing to compare where switch-on splits a later statement', () => {
    const facts = buildHousehold();
    const before = facts.statements[0];
    const split = { ...facts, house: { ...facts.house, switchOn: day('2025-07-20') } };
    expect(daysBetween(before?.from ?? day('2025-06-14'), before?.to ?? day('2025-07-14'))).toBe(30);
    expect(check(split, 0, 'daysInRange:').cause).toBe('A first cycle may have any length.');
  });
});
