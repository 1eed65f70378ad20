import { describe, expect, test } from 'vitest';
import type { IncentiveFacts, IncentiveReceipt } from '#shared/facts/finance.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { BUILT_TODAY, type BuildOptions, buildHousehold } from '#tests/support/build-household.ts';
import { check, checksOf } from './built-checks.ts';

/** The built house makes 1,420, 1,450 and 1,310 kWh in its first three cycles and sends out 430, 390 and 256: $63.90, $65.25 and $58.95 at $0.045. */
type Receipt = Partial<Omit<IncentiveReceipt, 'on' | 'amountCents'>> & { on: string; amountCents: number };

function household(
  receipts: readonly Receipt[],
  terms: Partial<IncentiveFacts> = {},
  options: BuildOptions = {},
): HouseholdFacts {
  const facts = buildHousehold(options);
  const received = receipts.map((one, at) => ({
    id: `r${at}`,
    note: null,
    from: null,
    to: null,
    quantityWh: null,
    documentId: null,
    ...one,
    on: day(one.on),
    amountCents: cents(one.amountCents),
  }));
  return { ...facts, incentive: facts.incentive && { ...facts.incentive, ...terms, received } };
}

const FIRST = { from: day('2025-06-14'), to: day('2025-07-14') };
const TWO = { from: day('2025-06-14'), to: day('2025-08-14') };
const QUANTITY = (id = 'r0') => `incentiveQuantity:${id}`;
const PAID = (id = '') => `incentivePaid:${id}`;

/** The household with a line for the incentive on a statement. */
function withLine(facts: HouseholdFacts, index: number, line: Partial<PrintedLine>): HouseholdFacts {
  const made: PrintedLine = {
    component: null,
    kind: 'incentive',
    label: 'Production credit',
    quantity: '1420',
    unit: 'kWh',
    rate: '0.045',
    amountCents: cents(-6390),
    inDue: true,
    row: null,
    ...line,
  };
  return {
    ...facts,
    statements: facts.statements.map((one, at) => (at === index ? { ...one, lines: [...one.lines, made] } : one)),
  };
}

/** Statements that say nothing of production. */
function noProduction(facts: HouseholdFacts, index: number): HouseholdFacts {
  return {
    ...facts,
    statements: facts.statements.map((one, at) =>
      at === index
        ? { ...one, productionWh: null, reads: one.reads.filter((read) => read.channel !== 'production') }
        : one,
    ),
  };
}

describe('the kWh an incentive was paid on', () => {
  test.each([
    [1420, 'agrees'],
    [1421, 'agrees'],
    [1422, 'differs'],
  ])('for a receipt of one cycle: %i kWh %s, a kWh either way', (kwh, verdict) => {
    const facts = household([{ on: '2025-08-01', amountCents: 6390, ...FIRST, quantityWh: wh(kwh * 1000) }]);
    const found = check(facts, 0, QUANTITY());
    expect([found.verdict, found.found]).toEqual([verdict, '1420']);
  });

  test('may be a kWh a cycle off over two', () => {
    const facts = household([{ on: '2025-09-01', amountCents: 12_915, ...TWO, quantityWh: wh(2_872_000) }]);
    expect(check(facts, 1, QUANTITY()).verdict).toBe('agrees');
    expect(checksOf(facts, 0).some((one) => one.key === QUANTITY())).toBe(false);
  });

  test.each([
    [
      'the export register’s',
      FIRST,
      430_000,
      /^It was paid on 990 kWh less than the production meter’s 1,420\. It is exactly the export register’s kWh\.$/,
    ],
    ['the next cycle’s', FIRST, 1_450_000, /It is exactly the production of one cycle later\.$/],
    ['one of the two left out', TWO, 1_420_000, /It is exactly the production without the cycle to 14 Aug\.$/],
    [
      'no quantity that is tried',
      FIRST,
      1_000_000,
      /^It was paid on 420 kWh less than the production meter’s 1,420\.$/,
    ],
    ['too much', FIRST, 1_500_000, /^It was paid on 80 kWh more/],
  ])('on %s is found by trying', (_, cover, quantityWh, words) => {
    const facts = household([{ on: '2025-09-20', amountCents: 100, ...cover, quantityWh: wh(quantityWh) }]);
    expect(check(facts, cover === TWO ? 1 : 0, QUANTITY()).cause).toMatch(words);
  });

  test('on the monitoring’s kWh, or the cycle before, is found too; two that fit are both named', () => {
    const watched = household(
      [
        {
          on: '2025-09-01',
          amountCents: 100,
          from: day('2025-07-14'),
          to: day('2025-08-14'),
          quantityWh: wh(1_420_000),
        },
      ],
      {},
      { intervals: { channels: ['monitor'], minutes: 1440 } },
    );
    const scaled = {
      ...watched,
      intervals: watched.intervals.map((one) =>
        one.day >= '2025-07-14' && one.day < '2025-08-14'
          ? { ...one, values: [one.day === '2025-07-14' ? 1_420_000 : 0] }
          : one,
      ),
    };
    expect(check(scaled, 1, QUANTITY()).cause).toMatch(
      /It is exactly the monitoring’s kWh, and exactly the production of one cycle earlier\.$/,
    );
  });

  test('counts the days in the term only; days outside it left in are named', () => {
    // Half of the first cycle lies in the term: 15 of 30 days, 710 of 1,420 kWh.
    const terms = { firstDay: day('2025-06-29') };
    const right = household([{ on: '2025-08-01', amountCents: 3195, ...FIRST, quantityWh: wh(710_000) }], terms);
    expect(check(right, 0, QUANTITY()).verdict).toBe('agrees');
    expect(check(right, 0, PAID('r0')).verdict).toBe('agrees');
    const wrong = household([{ on: '2025-08-01', amountCents: 6390, ...FIRST, quantityWh: wh(1_420_000) }], terms);
    expect(check(wrong, 0, QUANTITY()).cause).toMatch(
      /It is exactly all the production, also of days outside the term\.$/,
    );
    expect(check(wrong, 0, PAID('r0')).cause).toMatch(
      /^\$31\.95 more than \$31\.95 earned on 710 kWh\. It is exactly all the production/,
    );
  });

  test('is not tried on an export that is not known', () => {
    const facts = household([{ on: '2025-08-01', amountCents: 1935, ...FIRST, quantityWh: wh(430_000) }]);
    const blind = {
      ...facts,
      statements: facts.statements.map((one) => ({
        ...one,
        exportWh: null,
        reads: one.reads.filter((read) => read.channel !== 'export'),
      })),
    };
    expect(check(blind, 0, QUANTITY()).cause).not.toMatch(/exactly/);
  });

  test('to a fraction of a kWh must be that very quantity to be called exactly it', () => {
    const facts = household([{ on: '2025-09-01', amountCents: 100, ...FIRST, quantityWh: wh(430_400) }]);
    expect(check(facts, 0, QUANTITY()).cause).not.toMatch(/exactly/);
  });

  test('over days that are no whole cycles is read from a production file without a gap', () => {
    const cover = { from: day('2025-06-20'), to: day('2025-07-20') };
    const receipts = [{ on: '2025-08-01', amountCents: 6420, ...cover, quantityWh: wh(1_414_000) }];
    const facts = household(receipts, {}, { intervals: { channels: ['production'], minutes: 60 } });
    const found = check(facts, 1, QUANTITY());
    expect(found.verdict).toBe('differs');
    expect(found.tolerance).toBe('1');
    const gap = { ...facts, intervals: facts.intervals.filter((one) => one.day !== '2025-06-25') };
    expect(check(gap, 1, QUANTITY()).cause).toMatch(/^It begins or ends inside a cycle, and no production file/);
    expect(check(gap, 1, PAID('r0')).verdict).toBe('nothing-to-compare');
    const none = household(receipts);
    expect(check(none, 1, QUANTITY()).verdict).toBe('nothing-to-compare');
  });

  test('of a file counts the days in the term, none where none is', () => {
    const cover = { from: day('2025-06-20'), to: day('2025-07-20') };
    const receipts = [{ on: '2025-08-01', amountCents: 100, ...cover, quantityWh: wh(1_000) }];
    const files = { intervals: { channels: ['production' as const], minutes: 60 as const } };
    const after = household(receipts, { firstDay: day('2026-01-01') }, files);
    expect(check(after, 1, QUANTITY()).found).toBe('0');
    const before = household(receipts, { lastDay: day('2025-06-20') }, files);
    expect(Number(check(before, 1, QUANTITY()).found)).toBeCloseTo(1420 / 30, 1);
  });

  test('that begin before the record begins count from its first cycle', () => {
    const facts = household([
      { on: '2025-08-01', amountCents: 6390, from: day('2025-06-01'), to: FIRST.to, quantityWh: wh(1_420_000) },
    ]);
    expect(check(facts, 0, QUANTITY()).verdict).toBe('agrees');
  });

  test('is nothing to compare while a cycle’s production is not known, or a statement between is missing', () => {
    const facts = household([{ on: '2025-09-01', amountCents: 12_915, ...TWO, quantityWh: wh(2_870_000) }]);
    expect(check(noProduction(facts, 0), 1, QUANTITY()).cause).toBe(
      'The production of these days is not completely known.',
    );
    const three = household([
      { on: '2025-10-01', amountCents: 100, from: TWO.from, to: day('2025-09-14'), quantityWh: wh(4_180_000) },
    ]);
    const missing = { ...three, statements: three.statements.filter((_, at) => at !== 1) };
    expect(check(missing, 1, QUANTITY()).cause).toMatch(/^It begins or ends inside a cycle/);
  });

  test('on a line of the bill is that cycle’s production in the term', () => {
    const facts = household([], { paidAs: 'billCredit' });
    expect(check(withLine(facts, 0, {}), 0, QUANTITY('')).verdict).toBe('agrees');
    const export_ = check(withLine(facts, 0, { quantity: '430' }), 0, QUANTITY(''));
    expect(export_.cause).toMatch(/It is exactly the export register’s kWh\.$/);
    const unknown = check(noProduction(withLine(facts, 0, {}), 0), 0, QUANTITY(''));
    expect([unknown.verdict, unknown.stated]).toEqual(['nothing-to-compare', '1420']);
  });

  test('is not asked of a line without kWh, or where there is no programme', () => {
    const facts = household([], { paidAs: 'billCredit' });
    const has = (one: HouseholdFacts) => checksOf(one, 0).some((found) => found.check === 'incentiveQuantity');
    expect(has(withLine(facts, 0, { quantity: null, unit: null }))).toBe(false);
    expect(has(withLine(facts, 0, { quantity: '3', unit: 'USD' }))).toBe(false);
    expect(has(withLine({ ...facts, incentive: null }, 0, {}))).toBe(false);
  });

  test('on a line of the plan’s own is what the plan makes of the production: its term, its cap', () => {
    const facts = { ...household([]), incentive: null };
    const priced = (change: Partial<NonNullable<RatePlanInput['credits']>[number]>) => ({
      ...facts,
      plans: facts.plans.map((one) => ({
        ...one,
        plan: ratePlanSchema.parse({
          ...one.plan,
          credits: [
            ...one.plan.credits,
            {
              id: 'solarPay',
              label: 'Production credit',
              kind: 'incentive',
              basis: 'production',
              rates: [{ from: '2025-01-01', rate: '0.045' }],
              to: 'bill',
              ...change,
            },
          ],
        }),
      })),
    });
    const own = { component: 'solarPay' };
    const whole = check(withLine(priced({}), 0, own), 0, QUANTITY('solarPay'));
    expect([whole.verdict, whole.found]).toEqual(['agrees', '1420']);
    const half = priced({ term: { firstDay: '2025-06-29', lastDay: '2030-01-01' } });
    expect(check(withLine(half, 0, own), 0, QUANTITY('solarPay')).found).toBe('710');
    // Paid apart it stands beside the bill, and its kWh are looked for there.
    expect(check(withLine(priced({ to: 'separate' }), 0, own), 0, QUANTITY('solarPay')).found).toBe('1420');
    const over = priced({ term: { firstDay: '2024-01-01', lastDay: '2025-01-01' } });
    const ended = check(withLine(over, 0, own), 0, QUANTITY('solarPay'));
    expect([ended.verdict, ended.found]).toEqual(['differs', '0']);
    const noImport = withLine(priced({}), 0, own);
    const unsettled = {
      ...noImport,
      statements: noImport.statements.map((one) => ({
        ...one,
        importWh: null,
        reads: one.reads.filter((read) => read.channel !== 'import'),
      })),
    };
    expect(check(unsettled, 0, QUANTITY('solarPay')).verdict).toBe('nothing-to-compare');
    const noMeters = noProduction(withLine(priced({}), 0, own), 0);
    expect(check(noMeters, 0, QUANTITY('solarPay')).verdict).toBe('nothing-to-compare');
    const both = { ...withLine(priced({}), 0, own), incentive: household([], { paidAs: 'billCredit' }).incentive };
    expect(checksOf(both, 0).some((one) => one.check === 'incentivePaid')).toBe(false);
  });
});

describe('what an incentive paid', () => {
  test('for the days a receipt states is what they earned, compared where they end; the cycles before say so', () => {
    const facts = household([{ on: '2025-09-01', amountCents: 12_915, ...TWO }]);
    expect(check(facts, 1, PAID('r0')).verdict).toBe('agrees');
    const covered = check(facts, 0, PAID());
    expect(covered.verdict).toBe('nothing-to-compare');
    expect(covered.cause).toBe(
      'The receipt of 1 Sep 2025 covers this cycle; it is compared in the cycle to 14 Aug 2025.',
    );
  });

  test.each([
    [12_914, 'agrees'],
    [12_913, 'differs'],
  ])('over two cycles, each rounded once: %i cents %s', (amountCents, verdict) => {
    expect(check(household([{ on: '2025-09-01', amountCents, ...TWO }]), 1, PAID('r0')).verdict).toBe(verdict);
  });

  test('on the export register is found by the cents alone', () => {
    // 430 kWh × $0.045 = $19.35.
    const found = check(household([{ on: '2025-08-01', amountCents: 1935, ...FIRST }]), 0, PAID('r0'));
    expect(found.cause).toBe('$44.55 less than $63.90 earned on 1,420 kWh. It is exactly the export register’s kWh.');
  });

  test('for days that run past the last statement waits for it', () => {
    const facts = household([{ on: '2025-10-20', amountCents: 100, from: FIRST.from, to: day('2025-12-14') }]);
    expect(check(facts, 2, PAID()).cause).toBe(
      'The receipt of 20 Oct 2025 covers this cycle and days that are on no statement yet.',
    );
  });

  test('without stated days is matched oldest first: paid, paid in part, not paid yet', () => {
    const facts = household([{ on: '2025-09-20', amountCents: 10_000 }]);
    const first = check(facts, 0, PAID());
    expect([first.verdict, first.cause]).toEqual([
      'agrees',
      'Paid by the receipt of 20 Sep 2025, matched oldest first.',
    ]);
    const second = check(facts, 1, PAID());
    expect([second.verdict, second.stated]).toEqual(['nothing-to-compare', '36.10']);
    expect(second.cause).toBe('$29.15 earned to 14 Aug is not paid yet. $36.10 of it was paid, matched oldest first.');
    const third = check(facts, 2, PAID());
    expect([third.stated, third.advice]).toEqual([null, null]);
  });

  test('is late after half a year, and skipped where later cycles were paid by then', () => {
    const late = household([], {}, { cycles: 9 });
    const first = check(late, 0, PAID());
    expect(first.verdict).toBe('nothing-to-compare');
    expect(first.advice).toMatch(/^It is more than half a year old\./);
    expect(check(late, 8, PAID()).advice).toBeNull();
    const skipped = household(
      [{ on: '2025-09-01', amountCents: 6525, from: day('2025-07-14'), to: day('2025-08-14') }],
      {},
      { cycles: 9 },
    );
    const found = check(skipped, 0, PAID());
    expect([found.verdict, found.difference]).toEqual(['differs', '-63.90']);
    expect(found.cause).toBe('Later cycles were paid and this one was skipped.');
    expect(check(skipped, 2, PAID()).verdict).toBe('nothing-to-compare');
  });

  test('is not asked outside the term, nor without an incentive', () => {
    const none = (facts: HouseholdFacts) => checksOf(facts, 0).every((one) => one.check !== 'incentivePaid');
    expect(none(household([], { firstDay: day('2026-01-01') }))).toBe(true);
    expect(none(household([], { firstDay: day('2026-01-01'), paidAs: 'billCredit' }))).toBe(true);
    expect(none({ ...household([]), incentive: null })).toBe(true);
  });

  test('is nothing to compare while the production is not known', () => {
    expect(check(noProduction(household([]), 0), 0, PAID()).cause).toBe(
      'The production of this cycle is not completely known.',
    );
    const inBill = noProduction(withLine(household([], { paidAs: 'billCredit' }), 0, {}), 0);
    expect(check(inBill, 0, PAID()).advice).toBeNull();
  });

  test('inside the bill is compared with what that cycle earned', () => {
    const facts = household([], { paidAs: 'billCredit' });
    expect(check(withLine(facts, 0, {}), 0, PAID()).verdict).toBe('agrees');
    const short = check(withLine(facts, 0, { amountCents: cents(-1935) }), 0, PAID());
    expect(short.cause).toMatch(/It is exactly the export register’s kWh\.$/);
    const over = check(withLine(facts, 0, { amountCents: cents(-7000) }), 0, PAID());
    expect(over.cause).toBe('$6.10 more than $63.90 earned on 1,420 kWh.');
    const absent = check(facts, 0, PAID());
    expect([absent.verdict, absent.found]).toEqual(['nothing-to-compare', '63.90']);
    expect(absent.advice).toMatch(/^\$63\.90 was earned\./);
    const idle = household([], { paidAs: 'billCredit', ratePerKwh: '0' });
    expect(check(idle, 0, PAID()).advice).toBeNull();
  });

  test('a receipt that is exactly right in kWh and cents leaves the cycle balanced', () => {
    const facts = household([{ on: '2025-08-01', amountCents: 6390, ...FIRST, quantityWh: wh(1_420_000) }]);
    expect(computeLedger(facts, { today: BUILT_TODAY }).cycles[0]?.state).toBe('balanced');
    expect(addMonths(FIRST.from, 1)).toBe(FIRST.to);
  });
});
