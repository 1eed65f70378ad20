import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import { ratePlanSchema } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { check, checksOf } from './built-checks.ts';

const FIRST = 0;

function withFiles(...channels: IntervalChannel[]): HouseholdFacts {
  return buildHousehold({ intervals: { channels, minutes: 60 } });
}

/** The files without these days of a channel. */
function without(facts: HouseholdFacts, channel: IntervalChannel, ...days: string[]): HouseholdFacts {
  return {
    ...facts,
    intervals: facts.intervals.filter((one) => one.channel !== channel || !days.includes(one.day)),
  };
}

/** The files with the first reading of a day missing. */
function pierced(facts: HouseholdFacts, channel: IntervalChannel, on: string): HouseholdFacts {
  return {
    ...facts,
    intervals: facts.intervals.map((one) =>
      one.channel === channel && one.day === on
        ? { ...one, values: one.values.map((v, at) => (at === 9 ? null : v)) }
        : one,
    ),
  };
}

/** The same house on a plan that nets by the hour. */
function byHour(facts: HouseholdFacts): HouseholdFacts {
  return {
    ...facts,
    plans: facts.plans.map((one) => ({ ...one, plan: ratePlanSchema.parse({ ...one.plan, netting: 'hour' }) })),
  };
}

/** Statements that say nothing of production: no register, nothing printed. */
function noMeter(facts: HouseholdFacts): HouseholdFacts {
  return {
    ...facts,
    statements: facts.statements.map((one) => ({
      ...one,
      productionWh: null,
      reads: one.reads.filter((read) => read.channel !== 'production'),
    })),
  };
}

function gapKeys(facts: HouseholdFacts): string[] {
  return checksOf(facts, FIRST)
    .filter((one) => one.check === 'fileGaps')
    .map((one) => `${one.about} ${one.verdict}`);
}

describe('the gaps of a file', () => {
  test('none, and it agrees, channel by channel; a file that does not exist is not asked for', () => {
    expect(gapKeys(withFiles('import', 'monitor'))).toEqual(['import agrees', 'monitor agrees']);
    expect(gapKeys(buildHousehold())).toEqual([]);
  });

  test('are said and hold nothing up where no figure hangs on the file', () => {
    const found = check(
      without(withFiles('monitor'), 'monitor', '2025-06-20', '2025-06-21', '2025-07-02'),
      FIRST,
      'fileGaps:monitor',
    );
    expect([found.verdict, found.stated, found.found]).toEqual(['nothing-to-compare', '30', '27']);
    expect(found.cause).toBe(
      'The monitoring file lacks 3 whole days: 20 Jun to 21 Jun, 2 Jul. No figure of this cycle hangs on it.',
    );
  });

  test('names the first three stretches and says that there are more', () => {
    const facts = without(withFiles('import'), 'import', '2025-06-20', '2025-06-22', '2025-06-24', '2025-06-26');
    expect(check(facts, FIRST, 'fileGaps:import').cause).toMatch(/: 20 Jun, 22 Jun, 24 Jun and more\./);
  });

  test('differ where the plan nets inside the cycle, down to a single reading', () => {
    const facts = byHour(pierced(withFiles('import', 'export'), 'export', '2025-06-20'));
    const found = check(facts, FIRST, 'fileGaps:export');
    expect([found.verdict, found.difference]).toEqual(['differs', '1']);
    expect(found.cause).toBe('The export file lacks 1 reading: 20 Jun; the rate plan nets or prices inside the cycle.');
    expect(check(facts, FIRST, 'fileGaps:import').verdict).toBe('agrees');
  });

  test('a file the plan hangs on and that is not there is asked for by its days', () => {
    const found = check(byHour(buildHousehold()), FIRST, 'fileGaps:import');
    expect(found.verdict).toBe('nothing-to-compare');
    expect(found.advice).toBe('Upload the import file for 14 Jun to 13 Jul.');
  });

  test('nothing hangs on import and export before there is a plan', () => {
    const facts = { ...withFiles('import'), plans: [] };
    expect(gapKeys(without(facts, 'import', '2025-06-20'))).toEqual(['import nothing-to-compare']);
  });

  test('of production differ where no register gives it, since self-use and the incentive hang on it', () => {
    const facts = without(noMeter(withFiles('production', 'monitor')), 'production', '2025-06-20');
    const found = check(facts, FIRST, 'fileGaps:production');
    expect(found.verdict).toBe('differs');
    expect(found.cause).toMatch(/self-use and the incentive are worked out from it\.$/);
    const bare = { ...facts, incentive: null };
    expect(check(bare, FIRST, 'fileGaps:production').cause).toMatch(/; self-use is worked out from it\.$/);
  });

  test('of the monitoring differ where it is the only one to know the production, and only there', () => {
    const alone = without(noMeter(withFiles('monitor')), 'monitor', '2025-06-20');
    expect(gapKeys(alone)).toEqual(['monitor differs']);
    const beside = without(noMeter(withFiles('production', 'monitor')), 'monitor', '2025-06-20');
    expect(gapKeys(beside)).toEqual(['production agrees', 'monitor nothing-to-compare']);
  });

  test('a production file is asked for where nothing at all gives it; monitoring the house never had is not', () => {
    expect(gapKeys(noMeter(buildHousehold()))).toEqual(['production nothing-to-compare']);
    const later = noMeter(withFiles('monitor'));
    const silent = { ...later, intervals: later.intervals.filter((one) => one.day >= day('2025-07-14')) };
    expect(gapKeys(silent)).toEqual(['production nothing-to-compare', 'monitor nothing-to-compare']);
  });

  test('production as printed needs no file', () => {
    const facts = noMeter(buildHousehold());
    const printed = { ...facts, statements: facts.statements.map((one) => ({ ...one, productionWh: one.importWh })) };
    expect(gapKeys(printed)).toEqual([]);
  });
});
