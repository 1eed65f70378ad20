import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedBank, PrintedLine, Statement } from '#shared/facts/papers.ts';
import { type RatePlan, type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { changed, check, checksOf } from './built-checks.ts';

const lost = (facts: HouseholdFacts, index: number) =>
  checksOf(facts, index)
    .filter((one) => one.check === 'nothingLost')
    .map((one) => `${one.about} ${one.verdict}`);

describe('a meter exchange', () => {
  const on = day('2025-08-01');

  /** The net meter exchanged on a day of the second cycle; `change` then alters that statement. */
  function exchanged(change: (statement: Statement) => Statement = (statement) => statement): HouseholdFacts {
    return changed(1, (statement) =>
      change({
        ...statement,
        reads: statement.reads.flatMap((read) => {
          if (read.channel === 'production') return [read];
          const total = Number(read.current) - Number(read.previous);
          const old = { ...read, to: on, current: String(Number(read.previous) + 100) };
          return [old, { ...read, meter: 'net2', from: on, previous: '0', current: String(total - 100) }];
        }),
      }),
    );
  }

  test('loses nothing where old and new meter cover the whole statement', () => {
    const found = check(exchanged(), 1, 'nothingLost:exchange.import');
    expect([found.verdict, found.stated, found.found]).toEqual(['agrees', '31', '31']);
    expect(lost(exchanged(), 1)).toEqual(['exchange.import agrees', 'exchange.export agrees']);
    expect(lost(exchanged(), 0)).toEqual([]);
  });

  test('loses the days after the new meter’s last read', () => {
    const short = exchanged((statement) => ({
      ...statement,
      reads: statement.reads.map((read) => (read.meter === 'net2' ? { ...read, to: addDays(read.to, -3) } : read)),
    }));
    const found = check(short, 1, 'nothingLost:exchange.export');
    expect([found.verdict, found.difference]).toEqual(['differs', '-3']);
    expect(found.cause).toMatch(
      /read from 14 Jul 2025 to 11 Aug 2025; the statement runs from 14 Jul 2025 to 14 Aug 2025\.$/,
    );
  });

  test('whose reads do not meet is the registers’ own finding, and no second one', () => {
    const apart = exchanged((statement) => ({
      ...statement,
      reads: statement.reads.map((read) => (read.meter === 'net2' ? { ...read, from: addDays(on, 2) } : read)),
    }));
    expect(check(apart, 1, 'registersFollow:import:net2').verdict).toBe('differs');
    expect(lost(apart, 1)).toEqual([]);
  });

  test('between two statements is one where the old meter is gone', () => {
    const between = changed(1, (statement) => ({
      ...statement,
      reads: statement.reads.map((read) => (read.channel === 'export' ? { ...read, meter: 'net2' } : read)),
    }));
    expect(lost(between, 1)).toEqual(['exchange.export agrees']);
  });

  test('is none where a second meter is added and the first goes on', () => {
    const added = changed(1, (statement) => ({
      ...statement,
      reads: [
        ...statement.reads,
        ...statement.reads
          .filter((read) => read.channel === 'import')
          .map((read) => ({ ...read, meter: 'barn', from: on, previous: '0', current: '0' })),
      ],
    }));
    expect(lost(added, 1)).toEqual([]);
  });
});

/** The built plan with its export credit in kWh or dollars, in a bank of this id. */
function planWith(
  plan: RatePlan,
  bank: { id: string; unit: 'kWh' | 'USD' } & Partial<NonNullable<RatePlanInput['banks']>[number]>,
): RatePlan {
  const { id, unit } = bank;
  return ratePlanSchema.parse({
    ...plan,
    credits: plan.credits.map((credit) => ({
      ...credit,
      ...(unit === 'USD' ? { to: id } : { rates: null, ratesOf: null, to: id }),
    })),
    banks: [{ label: `Bank ${id}`, sameCycle: false, offsets: ['energy'], trueUps: [], ...bank }],
  });
}

describe('a change of rate plan', () => {
  /** The built household, on a plan from the third cycle on whose bank is `after`; the third statement prints these banks and lines as well. */
  function replanned(
    after: { id: string; unit: 'kWh' | 'USD' } | null,
    printed: { banks?: Partial<PrintedBank>[]; lines?: Partial<PrintedLine>[] } = {},
  ): HouseholdFacts {
    const facts = buildHousehold({ cycles: 3 });
    const [old] = facts.plans;
    if (!old) throw new Error('no plan');
    const plan =
      after === null ? ratePlanSchema.parse({ ...old.plan, credits: [], banks: [] }) : planWith(old.plan, after);
    const bank = {
      bank: 'other',
      unit: 'USD' as const,
      open: null,
      close: null,
      sentOut: null,
      sentValueCents: null,
      row: null,
    };
    const line = {
      component: null,
      kind: 'trueup' as const,
      label: 'Settled',
      quantity: null,
      unit: null,
      rate: null,
      amountCents: cents(0),
      inDue: true,
      row: null,
    };
    return {
      ...changed(
        2,
        (statement) => ({
          ...statement,
          banks: (printed.banks ?? []).map((one) => ({ ...bank, ...one })),
          // Without the line that spends the old balance.
          lines: [
            ...statement.lines.filter((one) => one.component !== 'creditBank'),
            ...(printed.lines ?? []).map((one) => ({ ...line, ...one })),
          ],
        }),
        facts,
      ),
      plans: [old, { from: day('2025-08-14'), plan, withoutRoof: null }],
    };
  }

  /** $37.05 came with July’s cycle (390 kWh × $0.095); $40.85 with June’s was spent on its energy. */
  const HELD = '37.05';
  const KEY = 'nothingLost:plan.creditBank';

  test('that keeps the bank is followed by the bank’s own check', () => {
    const facts = replanned({ id: 'creditBank', unit: 'USD' }, { banks: [{ bank: 'creditBank', open: '0.00' }] });
    expect(check(facts, 2, KEY).verdict).toBe('agrees');
    expect(check(facts, 2, 'bankChain:creditBank').verdict).toBe('differs');
  });

  test('that drops it loses what it held, unless the statement says what became of it', () => {
    const found = check(replanned(null), 2, KEY);
    expect([found.verdict, found.stated, found.found, found.unit]).toEqual(['differs', '0', HELD, 'USD']);
    expect(found.cause).toMatch(/^\$37\.05 of credit disappeared when the plan changed on 14 Aug 2025/);
  });

  test.each([
    [
      'a bank that opens with it',
      { banks: [{ bank: 'newBank', open: HELD }] },
      'The statement opens “newBank” with it.',
    ],
    [
      'a line that pays it',
      { lines: [{ label: 'Credit paid', amountCents: cents(-3705) }] },
      'The line “Credit paid” accounts for it.',
    ],
  ])('into %s loses nothing', (_, printed, cause) => {
    const found = check(replanned({ id: 'newBank', unit: 'USD' }, printed), 2, KEY);
    expect([found.verdict, found.cause]).toEqual(['agrees', cause]);
  });

  test.each([
    ['a bank that opens with something else', { banks: [{ bank: 'newBank', open: '12.00' }] }],
    ['a bank that prints no opening', { banks: [{ bank: 'newBank', open: null }] }],
    ['a bank of another unit', { banks: [{ bank: 'newBank', unit: 'kWh' as const, open: HELD }] }],
    ['a line of that size by which no balance ends', { lines: [{ kind: 'fixed' as const, amountCents: cents(3705) }] }],
    ['a line of another size', { lines: [{ amountCents: cents(-3700) }] }],
  ])('beside %s, it is lost', (_, printed) => {
    expect(check(replanned(null, printed), 2, KEY).verdict).toBe('differs');
  });

  test('is no event while the plan stays, or where the bank held nothing', () => {
    expect(lost(buildHousehold(), 2)).toEqual([]);
    const facts = replanned(null);
    const empty = {
      ...facts,
      statements: facts.statements.map((one) => ({
        ...one,
        banks: one.banks.map((bank) => ({ ...bank, close: '0.00' })),
      })),
    };
    expect(lost(empty, 2)).toEqual([]);
  });

  test('goes by the balance as carried where the last statement prints none, and says nothing where neither knows', () => {
    const facts = replanned(null);
    const silent = { ...facts, statements: facts.statements.map((one) => ({ ...one, banks: [] })) };
    expect(check(silent, 2, KEY).found).toBe(HELD);
    const unsettled = {
      ...silent,
      statements: silent.statements.map((one) => ({
        ...one,
        importWh: null,
        reads: one.reads.filter((read) => read.channel !== 'import'),
      })),
    };
    expect(lost(unsettled, 2)).toEqual([]);
  });

  test('of kWh is told in kWh, by a bank or by a line of so many', () => {
    const kwh = (facts: HouseholdFacts): HouseholdFacts => {
      const [old, ...rest] = facts.plans;
      if (!old) throw new Error('no plan');
      return {
        ...facts,
        plans: [{ ...old, plan: planWith(old.plan, { id: 'kwhBank', unit: 'kWh' }) }, ...rest],
        statements: facts.statements.map((one, at) =>
          at === 1
            ? {
                ...one,
                banks: one.banks.map((bank) => ({ ...bank, bank: 'kwhBank', unit: 'kWh' as const, close: '412' })),
              }
            : one,
        ),
      };
    };
    const found = check(kwh(replanned(null)), 2, 'nothingLost:plan.kwhBank');
    expect(found.cause).toMatch(/^412 kWh of credit disappeared/);
    const expired = replanned(null, { lines: [{ label: 'Expired', quantity: '-412', unit: 'kWh' }] });
    expect(check(kwh(expired), 2, 'nothingLost:plan.kwhBank').verdict).toBe('agrees');
    const dollars = replanned(null, {
      lines: [{ label: 'Paid', quantity: null, unit: null, amountCents: cents(-41_200) }],
    });
    expect(check(kwh(dollars), 2, 'nothingLost:plan.kwhBank').verdict).toBe('differs');
    const unsaid = replanned(null, { lines: [{ label: 'Paid', quantity: null, unit: 'kWh' }] });
    expect(check(kwh(unsaid), 2, 'nothingLost:plan.kwhBank').verdict).toBe('differs');
  });

  test('another bank both plans have does not account for it by chance', () => {
    const facts = replanned(null);
    const [old, next] = facts.plans;
    if (!old || !next) throw new Error('no plans');
    const second = { ...planWith(old.plan, { id: 'second', unit: 'USD' }).banks[0], label: 'Second' };
    const both = {
      ...facts,
      plans: [
        { ...old, plan: ratePlanSchema.parse({ ...old.plan, banks: [...old.plan.banks, second] }) },
        { ...next, plan: ratePlanSchema.parse({ ...next.plan, banks: [second] }) },
      ],
      statements: facts.statements.map((one, at) =>
        at === 2
          ? {
              ...one,
              banks: [
                {
                  bank: 'second',
                  unit: 'USD' as const,
                  open: HELD,
                  close: null,
                  sentOut: null,
                  sentValueCents: null,
                  row: null,
                },
              ],
            }
          : one,
      ),
    };
    expect(check(both, 2, KEY).verdict).toBe('differs');
  });
});

describe('a true-up', () => {
  /** The built household, its bank emptied at the close of the second cycle. */
  function truedUp(
    trueUp: Record<string, unknown>,
    banks: (one: PrintedBank) => PrintedBank[] = (one) => [one],
  ): HouseholdFacts {
    const facts = buildHousehold({ cycles: 3 });
    return {
      ...facts,
      plans: facts.plans.map((one) => ({
        ...one,
        plan: ratePlanSchema.parse({
          ...one.plan,
          banks: one.plan.banks.map((bank) => ({ ...bank, trueUps: [{ at: { months: [8] }, ...trueUp }] })),
        }),
      })),
      statements: facts.statements.map((one, at) => (at === 1 ? { ...one, banks: one.banks.flatMap(banks) } : one)),
    };
  }
  const KEY = 'nothingLost:trueUp.creditBank';
  const emptied = (bank: PrintedBank) => [{ ...bank, close: '0.00' }];

  test('that leaves the printed balance agrees, and says what left', () => {
    const found = check(truedUp({ action: 'expire' }, emptied), 1, KEY);
    expect([found.verdict, found.advice]).toEqual(['agrees', null]);
    expect(found.cause).toBe('By the plan $37.05 expired, and the balance printed after it is right.');
  });

  test('that pays apart from the bill says which payment to look for', () => {
    const found = check(truedUp({ action: 'pay', to: 'separate' }, emptied), 1, KEY);
    expect(found.cause).toMatch(/^By the plan \$37\.05 was paid for,/);
    expect(found.advice).toBe('$37.05 should come apart from the bill.');
  });

  test('whose printed balance is another is the bank’s own finding, and no second one', () => {
    const facts = truedUp({ action: 'expire' });
    expect(check(facts, 1, 'bankChain:creditBank.close').verdict).toBe('differs');
    expect(lost(facts, 1)).toEqual([]);
  });

  test('without a printed balance has nothing to compare and says what should have left', () => {
    const expired = check(
      truedUp({ action: 'expire' }, () => []),
      1,
      KEY,
    );
    expect([expired.verdict, expired.advice]).toEqual([
      'nothing-to-compare',
      'Ask the utility for the balance after this cycle.',
    ]);
    const paid = check(
      truedUp({ action: 'pay', to: 'separate' }, () => []),
      1,
      KEY,
    );
    expect(paid.advice).toBe('$37.05 should come apart from the bill.');
    const unprinted = check(
      truedUp({ action: 'expire' }, (bank) => [{ ...bank, close: null }]),
      1,
      KEY,
    );
    expect(unprinted.verdict).toBe('nothing-to-compare');
  });

  test('is no event in a cycle without one, nor in a split first cycle', () => {
    expect(lost(truedUp({ action: 'expire' }, emptied), 0)).toEqual([]);
    const facts = truedUp({ action: 'expire' });
    const split = { ...facts, house: { ...facts.house, switchOn: day('2025-07-20') } };
    expect(lost(split, 0)).toEqual([]);
  });

  test('of a kWh bank is told in kWh', () => {
    const facts = truedUp({ action: 'expire' }, () => []);
    const kwh = {
      ...facts,
      plans: facts.plans.map((one) => ({
        ...one,
        plan: ratePlanSchema.parse({
          ...one.plan,
          netting: 'cycle',
          credits: [],
          banks: [
            {
              id: 'kwhBank',
              label: 'kWh',
              unit: 'kWh',
              offsets: ['energy'],
              trueUps: [{ at: { months: [8] }, action: 'expire' }],
            },
          ],
        }),
      })),
      opening: { ...facts.opening, banks: { kwhBank: '900' } },
    };
    expect(check(kwh, 1, 'nothingLost:trueUp.kwhBank').cause).toMatch(/^By the plan [\d.]+ kWh expired in this cycle;/);
  });
});
