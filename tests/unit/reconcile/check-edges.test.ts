import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine, Statement } from '#shared/facts/papers.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlanInput } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { buildHousehold, builtPlan } from '#tests/support/build-household.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { changed, check, checksOf, differing, withLine } from './built-checks.ts';

/** The built household on its plan with some parts changed, in force all along. */
function onPlan(part: Partial<RatePlanInput>, facts = buildHousehold({ exportTo: 'bill' })): HouseholdFacts {
  return { ...facts, plans: [{ from: day('2025-01-01'), plan: planWith(part), withoutRoof: null }] };
}

function planWith(part: Partial<RatePlanInput>) {
  return taken(parsePlan({ ...builtPlan('bill'), banks: [], ...part }));
}

function due(statement: Statement): Statement {
  const parts = statement.lines.filter((line) => line.inDue).map((line) => line.amountCents);
  const brought = (statement.previousBalanceCents ?? 0) + (statement.paymentsCents ?? 0);
  return { ...statement, amountDueCents: cents(parts.reduce<number>((sum, one) => sum + one, brought)) };
}

const FROM = '2025-01-01';
const ENERGY = { id: 'energy', label: 'Import', kind: 'import', basis: 'import' } as const;

describe('the bank’s opening', () => {
  test('is compared with the last statement’s close also where that one was billed before any plan was entered', () => {
    const facts = buildHousehold();
    const later = { ...facts, plans: facts.plans.map((plan) => ({ ...plan, from: day('2025-07-14') })) };
    expect(check(later, 1, 'bankChain:creditBank').verdict).toBe('agrees');
    const lost = changed(1, (s) => ({ ...s, banks: s.banks.map((bank) => ({ ...bank, open: '0.00' })) }), later);
    expect(check(lost, 1, 'bankChain:creditBank')).toMatchObject({
      verdict: 'differs',
      found: '40.85',
      cause: 'It closed at $40.85 on 14 Jul and opens at $0.00.',
    });
  });

  test('is compared with what the ledger carried where the last statement prints no close', () => {
    const facts = changed(0, (s) => ({ ...s, banks: [] }));
    expect(check(facts, 1, 'bankChain:creditBank')).toMatchObject({ verdict: 'agrees', found: '40.85' });
  });

  test('has nothing before it in the first statement', () => {
    expect(check(buildHousehold(), 0, 'bankChain:creditBank')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'This is the first cycle.',
    });
  });
});

describe('a mistake beside credit sent to another place', () => {
  test('is found all the same: what was sent is no part of it', () => {
    const sent = (at: number) => (s: Statement) => ({
      ...s,
      banks: s.banks.map((bank) => {
        const lower = (text: string | null) => (text === null ? null : (Number(text) - 10).toFixed(2));
        if (at === 1) return { ...bank, close: lower(bank.close), sentOut: '10.00' };
        return { ...bank, open: lower(bank.open), close: lower(bank.close) };
      }),
    });
    const built = buildHousehold();
    const share = { ...built, house: { ...built.house, aggregation: 'share' as const } };
    const facts = changed(2, sent(2), changed(1, sent(1), share));
    expect(differing(facts, 1)).toEqual([]);
    const doubled = changed(
      1,
      (s) => due(withLine('benefits', (line) => ({ ...line, amountCents: cents(line.amountCents * 10) }))(s)),
      facts,
    );
    expect(check(doubled, 1, 'amountDue:').verdict).toBe('differs');
    const lost = changed(
      1,
      (s) => ({
        ...due(withLine('creditBank', (line) => ({ ...line, amountCents: cents(0) }))(s)),
        banks: s.banks.map((bank) => ({ ...bank, open: '0.00', close: '27.05' })),
      }),
      facts,
    );
    expect(check(lost, 1, 'amountDue:').cause).toMatch(/^Credit brought in opens with nothing/);
  });
});

describe('the account', () => {
  test('a previous balance is told by the last statement’s date, else by the last day it bills', () => {
    const facts = changed(1, (s) => ({ ...s, previousBalanceCents: cents((s.previousBalanceCents ?? 0) + 100) }));
    expect(check(facts, 1, 'balanceChain:').cause).toMatch(/^The statement of 17 Jul 2025 asked for/);
    const undated = changed(0, (s) => ({ ...s, statementOn: null }), facts);
    expect(check(undated, 1, 'balanceChain:').cause).toMatch(/^The statement of 14 Jul 2025 asked for/);
  });

  test('the first statement’s previous balance is faced with the one stated in the set-up', () => {
    const facts = changed(0, (s) => ({ ...s, previousBalanceCents: cents(500) }));
    const stated = (balance: number) => ({ ...facts, opening: { ...facts.opening, balanceCents: cents(balance) } });
    expect(check(stated(500), 0, 'balanceChain:').verdict).toBe('agrees');
    expect(check(stated(1200), 0, 'balanceChain:')).toMatchObject({
      verdict: 'differs',
      difference: '-7.00',
      cause: 'The set-up states a balance of $12.00 before the first cycle; the statement brings in $5.00.',
    });
  });

  test('a total that is off though every line is right to the cent says so', () => {
    const off = changed(1, (s) =>
      due({
        ...s,
        lines: s.lines.map((line) =>
          line.amountCents === 0 ? line : { ...line, amountCents: cents(line.amountCents + 1) },
        ),
      }),
    );
    expect(differing(off, 1)).toEqual(['amountDue:']);
    expect(check(off, 1, 'amountDue:').cause).toBe('The lines agree one by one; the total does not.');
  });
});

describe('energy', () => {
  const SPLIT_FROM = day('2025-06-14');
  /** The first statement began ten days before switch-on, without a read on the day. */
  const began = (facts: HouseholdFacts) =>
    changed(
      0,
      (s) => ({
        ...s,
        from: addDays(SPLIT_FROM, -10),
        reads: s.reads.map((read) => ({ ...read, from: addDays(SPLIT_FROM, -10) })),
      }),
      facts,
    );

  test('shared by days at switch-on is not compared; a complete interval file is shown beside it, an incomplete one is not', () => {
    const facts = began(buildHousehold({ intervals: { channels: ['import'], minutes: 1440 } }));
    const cause = 'The statement began before switch-on, and its kWh are shared by days.';
    expect(check(facts, 0, 'importAgainstIntervals:')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause,
      stated: null,
      found: '450',
    });
    const short = { ...facts, intervals: facts.intervals.filter((one) => one.day !== '2025-06-20') };
    expect(check(short, 0, 'importAgainstIntervals:')).toMatchObject({ cause, found: null });
    expect(check(facts, 0, 'exportAgainstIntervals:')).toMatchObject({ cause, found: null });
  });

  test('billed in another unit is no kWh: then those beside the registers stand', () => {
    const daily = changed(1, (s) => ({
      ...withLine('energy', (line) => ({ ...line, unit: 'day', quantity: '31' }))(s),
      reads: [],
    }));
    expect(check(daily, 1, 'importAgainstIntervals:').stated).toBe('520');
    const parted = (unit: 'kWh' | 'day') =>
      changed(1, (s) => ({
        ...s,
        importWh: null,
        reads: [],
        lines: s.lines.flatMap((line) =>
          line.component === 'energy' || line.component === 'benefits'
            ? [
                { ...line, quantity: '300' },
                { ...line, quantity: '220', unit },
              ]
            : [line],
        ),
      }));
    expect(check(parted('kWh'), 1, 'importAgainstIntervals:').stated).toBe('520');
    expect(check(parted('day'), 1, 'importAgainstIntervals:').stated).toBeNull();
  });

  test('sent out may exceed what was made by 4 % and 2 kWh, and by no Wh more', () => {
    const sending = (watthours: number) =>
      changed(1, (s) => ({
        ...s,
        reads: s.reads.filter((read) => read.channel === 'import'),
        exportWh: wh(watthours),
        productionWh: wh(100_000),
      }));
    expect(check(sending(106_000), 1, 'exportWithinProduction:').verdict).toBe('agrees');
    expect(check(sending(106_001), 1, 'exportWithinProduction:').verdict).toBe('differs');
  });

  test('readings missing on days that have others are counted apart from whole days', () => {
    const facts = buildHousehold({ intervals: { channels: ['import'], minutes: 60 } });
    const without = (days: number) => ({
      ...changed(1, (s) => ({ ...s, reads: [] }), facts),
      intervals: facts.intervals
        .filter((one) => days === 0 || one.day !== '2025-07-21')
        .map((one) =>
          one.day === '2025-07-20' ? { ...one, values: one.values.map((v, at) => (at < 5 ? null : v)) } : one,
        ),
    });
    const lacks = (facts: HouseholdFacts) => check(facts, 1, 'importAgainstIntervals:').cause;
    expect(lacks(without(0))).toBe('The import interval file lacks 5 readings of this cycle’s 31 days.');
    expect(lacks(without(1))).toBe('The import interval file lacks 1 day and 5 readings of this cycle’s 31 days.');
  });

  test('the monitor’s distance from the production meter is said in percent of the meter', () => {
    const facts = buildHousehold({ intervals: { channels: ['monitor'], minutes: 1440 } });
    const [first] = facts.intervals.filter((one) => one.day === '2025-07-20');
    const less = {
      ...facts,
      intervals: facts.intervals.map((one) =>
        one === first ? { ...one, values: [Number(one.values[0]) - 29_000] } : one,
      ),
    };
    expect(check(less, 1, 'productionAgainstMonitor:')).toMatchObject({
      verdict: 'agrees',
      difference: '29',
      cause: 'They lie 2 % apart; up to 5 % is ordinary.',
    });
  });

  test('a production meter that stood still is told apart from a monitor that counted', () => {
    const facts = buildHousehold({ intervals: { channels: ['monitor'], minutes: 1440 } });
    const still = changed(
      1,
      (s) => ({
        ...s,
        productionWh: null,
        reads: s.reads.map((read) => (read.channel === 'production' ? { ...read, current: read.previous } : read)),
      }),
      facts,
    );
    expect(check(still, 1, 'productionAgainstMonitor:')).toMatchObject({
      verdict: 'differs',
      stated: '0',
      found: '1450',
      cause: 'They lie apart.',
    });
  });
});

describe('meters', () => {
  test('two that are read on the same days follow on each by itself', () => {
    const two = (statement: Statement): Statement => ({
      ...statement,
      reads: statement.reads.flatMap((read) =>
        read.channel === 'import' ? [read, { ...read, meter: 'shed', previous: '10', current: '10' }] : [read],
      ),
    });
    const facts = changed(1, two, changed(0, two));
    expect(check(facts, 1, 'registersFollow:import:net').verdict).toBe('agrees');
    expect(check(facts, 1, 'registersFollow:import:shed').verdict).toBe('agrees');
    const off = changed(
      1,
      (s) => ({ ...s, reads: s.reads.map((read) => (read.meter === 'shed' ? { ...read, previous: '9' } : read)) }),
      facts,
    );
    expect(differing(off, 1)).toContain('registersFollow:import:shed');
    expect(check(off, 1, 'registersFollow:import:net').verdict).toBe('agrees');
  });

  test('the first joint that does not meet is told, also where a later one does', () => {
    const facts = changed(1, (s) => ({
      ...s,
      reads: s.reads.flatMap((read) => {
        if (read.channel !== 'import') return [read];
        const on = day('2025-08-01');
        const middle = String(Number(read.previous) + 200);
        return [
          { ...read, previous: String(Number(read.previous) - 4), to: on, current: middle },
          { ...read, from: on, previous: middle },
        ];
      }),
    }));
    expect(check(facts, 1, 'registersFollow:import:net')).toMatchObject({ verdict: 'differs', difference: '-4' });
  });

  test('a channel estimated while another is read settles on its own actual read', () => {
    const facts = changed(1, (s) => ({
      ...s,
      reads: s.reads.map((read) => (read.channel === 'export' ? { ...read, type: 'estimated' as const } : read)),
    }));
    expect(check(facts, 1, 'readType:')).toMatchObject({
      stated: 'estimated',
      cause: 'The export read is an estimate, made up for by the actual read of 14 Sep.',
    });
    expect(check(facts, 2, 'readType:').verdict).toBe('agrees');
    const open = changed(2, (s) => ({ ...s, reads: s.reads.filter((read) => read.channel !== 'export') }), facts);
    expect(check(open, 1, 'readType:').cause).toMatch(/^The export read is an estimate\. The next actual read settles/);
  });
});

describe('the price of a line', () => {
  const plus = (amount: number) => (line: PrintedLine) => ({ ...line, amountCents: cents(line.amountCents + amount) });

  test('by the day is the cycle’s days at the plan’s price, whatever quantity is printed', () => {
    const daily = onPlan({
      charges: [
        { ...ENERGY, rates: [{ from: FROM, rate: '0.1684' }] },
        {
          id: 'customer',
          label: 'Customer charge',
          kind: 'fixed',
          basis: 'day',
          rates: [{ from: FROM, rate: '0.50' }],
        },
      ],
    });
    expect(check(daily, 1, 'linePrice:customer')).toMatchObject({
      stated: '14.50',
      found: '15.50',
      verdict: 'differs',
    });
  });

  test('in tiers is the bill settled on the billed kWh, and said tier by tier', () => {
    const rates = [
      { from: FROM, tier: 1, rate: '0.1684' },
      { from: FROM, tier: 2, rate: '0.2084' },
    ];
    const tiered = onPlan({
      charges: [{ ...ENERGY, rates, tiers: [{ from: FROM, per: 'cycle', limits: ['400'] }] }],
    });
    const price = check(tiered, 1, 'linePrice:energy');
    // 400 × 0.1684 + 120 × 0.2084, each rounded.
    expect(price).toMatchObject({ stated: '87.57', found: '92.37', verdict: 'differs' });
    expect(price.cause).toBe('Import was priced at the tier 1 rate for tier 2.');
    const odd = changed(1, withLine('energy', plus(13)), tiered);
    expect(check(odd, 1, 'linePrice:energy').cause).toMatch(
      /^Import is billed at \$87\.70; by the rate plan it is 400 kWh × \$0\.1684.* \+ 120 kWh × \$0\.2084.*, \$92\.37\.$/,
    );
  });

  test('that only its place among the others gives is told apart from one the statement gives no quantity for', () => {
    const periods = [
      { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
      { id: 'off', label: 'Off-peak', when: 'rest' },
    ] as const;
    const byPeriod = onPlan({
      calendar: { periods: periods.map((one) => ({ ...one, when: one.when === 'rest' ? 'rest' : [...one.when] })) },
      charges: [
        {
          ...ENERGY,
          rates: [
            { from: FROM, period: 'peak', rate: '0.30' },
            { from: FROM, period: 'off', rate: '0.10' },
          ],
        },
      ],
    });
    // Without interval data nothing says which kWh were at which price.
    expect(check(byPeriod, 1, 'linePrice:energy')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'The rate plan cannot price this line by itself.',
    });
    const bare = changed(
      1,
      withLine('energy', (line) => ({ ...line, quantity: null })),
      byPeriod,
    );
    expect(check(bare, 1, 'linePrice:energy').cause).toBe(
      'The statement prints no quantity for this line. Add it to check the price.',
    );
  });

  test('that is a percentage is nothing to compare where a line of its base is not printed', () => {
    const facts = changed(1, (s) => ({ ...s, lines: s.lines.filter((line) => line.component !== 'benefits') }));
    expect(check(facts, 1, 'linePrice:franchise')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'A line this percentage is taken on is not printed.',
    });
  });

  test('that is a minimum is what the rest of the bill leaves to make up, and said to need it where the cycle cannot be settled', () => {
    const least = onPlan({
      charges: [
        { ...ENERGY, rates: [{ from: FROM, rate: '0.1684' }] },
        {
          id: 'customer',
          label: 'Minimum',
          kind: 'minimum',
          basis: 'floor',
          per: 'cycle',
          on: ['energy'],
          rates: [{ from: FROM, rate: '5' }],
        },
      ],
    });
    const unread = changed(
      1,
      (s) => ({ ...s, reads: [], exportWh: null, lines: s.lines.filter((line) => line.component !== 'exportCredit') }),
      least,
    );
    expect(check(unread, 1, 'linePrice:customer').cause).toBe('The rate plan cannot price this line by itself.');
    expect(check(least, 1, 'linePrice:customer')).toMatchObject({
      stated: '14.50',
      found: '0.00',
      cause: 'Customer charge is billed at $14.50; by the rate plan it is what is missing to $5 a cycle, $0.00.',
    });
  });

  test('printed in several parts is compared once, a cent for each part', () => {
    const parted = (off: number) =>
      changed(1, (s) => ({
        ...s,
        lines: s.lines.flatMap((line) => {
          if (line.component !== 'energy') return [line];
          return [
            { ...line, quantity: '200', amountCents: cents(3368) },
            { ...line, quantity: '320', amountCents: cents(5389 + off) },
          ];
        }),
      }));
    const prices = (facts: HouseholdFacts) =>
      checksOf(facts, 1)
        .filter((one) => one.key === 'linePrice:energy')
        .map((one) => [one.stated, one.verdict]);
    expect(prices(parted(2))).toEqual([['87.59', 'agrees']]);
    expect(prices(parted(3))).toEqual([['87.60', 'differs']]);
  });

  test('of a bank’s own line is left to the bank', () => {
    const facts = changed(1, withLine('creditBank', plus(-100)));
    expect(checksOf(facts, 1).map((one) => one.key)).not.toContain('linePrice:creditBank');
  });
});
