import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import type { PrintedBudget, Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { assembleCycles } from '#shared/ledger/cycles.ts';
import { owedOf } from '#shared/ledger/owed.ts';
import { billSentence } from '#shared/ledger/sentences.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { type BudgetMonth, onBudget, serviceLine } from '#tests/support/budget-household.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { changed, check, checksOf, differing, withLine } from './built-checks.ts';

const PLAIN: BudgetMonth = { instalment: 11_800 };
const SETTLING: BudgetMonth = { instalment: 11_800, settled: -2310 };
const plain = () => onBudget(buildHousehold(), () => PLAIN);
const compute = (facts: HouseholdFacts) => computeLedger(facts, { today: BUILT_TODAY });

/** Electric charges of a statement as printed, added apart from the ledger. */
function chargesOf(statement: Statement | undefined): number {
  return (statement?.lines ?? []).reduce((sum, line) => sum + (line.inDue ? line.amountCents : 0), 0);
}

function withBudget(change: (budget: PrintedBudget, statement: Statement) => Partial<PrintedBudget>) {
  return (statement: Statement): Statement =>
    statement.budget === null
      ? statement
      : { ...statement, budget: { ...statement.budget, ...change(statement.budget, statement) } };
}

function dueHigher(by: (statement: Statement) => number) {
  return (statement: Statement): Statement => ({
    ...statement,
    amountDueCents: cents(statement.amountDueCents + by(statement)),
  });
}

describe('a bill on a budget plan', () => {
  test('is balanced where the amount due is the budget amount and the balance takes the rest', () => {
    const facts = onBudget(buildHousehold({ cycles: 14 }), (at) => (at === 12 ? SETTLING : PLAIN));
    for (const cycle of compute(facts).cycles) {
      expect(cycle.checks.filter((one) => one.verdict === 'differs')).toEqual([]);
      expect(cycle.state).toBe('balanced');
      expect(cycle.oursDueCents).toBe(cycle.billedDueCents);
    }
    expect(check(facts, 1, 'budgetChain:').verdict).toBe('agrees');
    expect(check(facts, 12, 'budgetChain:').verdict).toBe('agrees');
    expect(check(facts, 12, 'linesAddUp:').verdict).toBe('agrees');
  });

  test('counts the real charges as the bill as it was, never the budget amount', () => {
    const bare = compute(buildHousehold());
    const budgeted = compute(plain());
    expect(budgeted.cycles.map((cycle) => cycle.asItWas.amountCents)).toEqual(
      bare.cycles.map((cycle) => cycle.asItWas.amountCents),
    );
    expect(budgeted.entries.filter((entry) => entry.book === 'billAvoided')).toEqual(
      bare.entries.filter((entry) => entry.book === 'billAvoided'),
    );
    expect(budgeted.entries).toHaveLength(bare.entries.length);
  });

  test('keeps the budget amount apart under the electric total on the facing pages', () => {
    const facts = plain();
    const cycle = compute(facts).cycles[1];
    const keys = cycle?.facing.map((line) => line.key) ?? [];
    const at = keys.indexOf('subtotal:electric');
    expect(cycle?.facing[at]).toMatchObject({ label: 'Electric charges', verdict: 'agrees' });
    expect(cycle?.facing[at]?.billed?.amountCents).toBe(chargesOf(facts.statements[1]));
    expect(cycle?.facing[at + 1]).toMatchObject({ label: 'Budget amount', billed: { amountCents: 11_800 } });
    expect(keys.at(-1)).toBe('due');
  });

  test('shows every figure with a working that comes to it', () => {
    const facts = onBudget(buildHousehold(), (at) => ({ ...(at === 2 ? SETTLING : PLAIN), services: { Water: 4115 } }));
    const worked = everyWorking(compute(facts));
    expect(worked.length).toBeGreaterThan(50);
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
  });

  test('compares the charges for electricity, which the amount due does not hold, and names the mistake in them', () => {
    const wrong = changed(
      1,
      withLine('customer', (line) => ({ ...line, amountCents: cents(line.amountCents + 900) })),
      plain(),
    );
    // The balance as printed follows the wrong charge.
    const facts = changed(
      1,
      withBudget((budget) => ({ balanceCents: cents((budget.balanceCents ?? 0) + 900) })),
      wrong,
    );
    const electric = check(facts, 1, 'amountDue:electric');
    expect([electric.verdict, electric.difference]).toEqual(['differs', '9.00']);
    expect(check(facts, 1, 'amountDue:').verdict).toBe('agrees');
    const owed = owedOf(compute(facts).cycles);
    expect(owed.rows.map((row) => row.dueCents)).toEqual([900]);
  });

  test('has the mistake in its charges found by settling again, as any bill', () => {
    const short = buildHousehold({
      exportTo: 'bill',
      intervals: { channels: ['import', 'export'], minutes: 60 },
      change: (cycle, at) => (at === 2 ? { ...cycle, creditedKwh: cycle.exportKwh - 44 } : cycle),
    });
    const services = { Water: 4115 };
    const fuel = serviceLine('Fuel, June to August', 212, 'adjustment');
    const withFuel = { ...short, statements: short.statements.map((one) => ({ ...one, lines: [...one.lines, fuel] })) };
    for (const facts of [short, withFuel]) {
      const cycle = compute(onBudget(facts, () => ({ ...PLAIN, services }))).cycles[2];
      expect(cycle?.causes).toEqual([
        { cause: 'exportShort', words: 'It credits 44 kWh less than your meter saw leave.' },
      ]);
      expect(cycle?.checks.find((one) => one.key === 'amountDue:electric')).toMatchObject({
        verdict: 'differs',
        difference: '4.18',
        cause: 'It credits 44 kWh less than your meter saw leave.',
      });
      expect(billSentence(cycle as Cycle)).toBe(
        'The bill is $4.18 too high: it credits 44 kWh less than your meter saw leave.',
      );
    }
  });

  test('is refused without its real charges: the amount due does not say them', () => {
    const facts = changed(1, (statement) => ({ ...statement, lines: [] }), plain());
    const read = householdFacts.safeParse(facts);
    expect(read.success).toBe(false);
    expect(read.error?.issues.map((issue) => issue.message)).toEqual([
      'With a budget amount, add the real charges as lines: the amount due does not say them.',
    ]);
    expect(householdFacts.safeParse(plain()).success).toBe(true);
  });

  test('takes an export made before budget plans were kept as one without', () => {
    const { budget: _, ...old } = plain().statements[0] as Statement;
    const read = householdFacts.parse({ ...buildHousehold(), statements: [old] });
    expect(read.statements[0]?.budget).toBeNull();
  });
});

describe('what is wrong with an amount due on a budget plan is found by trying', () => {
  const cases: [string, (statement: Statement) => number][] = [
    ['The budget amount of $118.00 is charged twice.', () => 11_800],
    ['The budget amount of $118.00 is left out.', () => -11_800],
    ['are charged on top of the budget amount.', chargesOf],
    ['are asked for in place of the budget amount.', (statement) => chargesOf(statement) - 11_800],
    ['is charged as if it were due.', (statement) => statement.budget?.balanceCents ?? 0],
  ];

  test.each(cases)('%s', (words, by) => {
    const found = check(changed(1, dueHigher(by), plain()), 1, 'linesAddUp:');
    expect(found.verdict).toBe('differs');
    expect(found.cause).toContain(words);
    expect(found.cause).not.toContain('Any one of these');
    // The amount due is said with the same cause, and the charges are not blamed.
    const facts = changed(1, dueHigher(by), plain());
    expect(check(facts, 1, 'amountDue:').cause).toBe(found.cause);
    expect(differing(facts, 1)).toEqual(['linesAddUp:', 'amountDue:']);
  });

  test.each([
    ['The settlement of −$23.10 is left out.', 2310],
    ['The settlement of −$23.10 is counted twice.', -2310],
  ])('%s', (words, by) => {
    const settling = onBudget(buildHousehold(), (at) => (at === 1 ? SETTLING : PLAIN));
    expect(
      check(
        changed(
          1,
          dueHigher(() => by),
          settling,
        ),
        1,
        'linesAddUp:',
      ).cause,
    ).toBe(words);
  });

  test('says what it comes to where no mistake that is tried gives the printed cents', () => {
    expect(
      check(
        changed(
          1,
          dueHigher(() => 77),
          plain(),
        ),
        1,
        'linesAddUp:',
      ).cause,
    ).toBe('With the budget amount it comes to $118.00; the statement asks for $118.77.');
  });

  test('is named where the bill prints no budget balance, too', () => {
    const unprinted = changed(
      1,
      withBudget(() => ({ balanceCents: null })),
      plain(),
    );
    expect(
      check(
        changed(
          1,
          dueHigher(() => 11_800),
          unprinted,
        ),
        1,
        'linesAddUp:',
      ).cause,
    ).toBe('The budget amount of $118.00 is charged twice.');
  });

  test('asks for what is owed: the amount due over its parts', () => {
    const owed = owedOf(
      compute(
        changed(
          1,
          dueHigher(() => 11_800),
          plain(),
        ),
      ).cycles,
    );
    expect(owed.rows.map((row) => row.dueCents)).toEqual([11_800]);
  });
});

describe('what is wrong with a budget balance is found by trying', () => {
  const at = 2;
  const before = (facts: HouseholdFacts) => facts.statements[at - 1]?.budget?.balanceCents ?? 0;
  const cases: [string, (facts: HouseholdFacts, statement: Statement) => number][] = [
    ['was not carried from the last statement.', (facts) => -before(facts)],
    ['were not put into it.', (_, statement) => -chargesOf(statement)],
    ['was not taken off it.', () => 11_800],
    ['was taken off it twice.', () => -11_800],
    ['were put into it twice.', (_, statement) => chargesOf(statement)],
    ['It stands still', (_, statement) => 11_800 - chargesOf(statement)],
    ['Its sign is turned round.', (_, statement) => -2 * (statement.budget?.balanceCents ?? 0)],
  ];

  test.each(cases)('%s', (words, by) => {
    const facts = plain();
    const wrong = withBudget((budget, statement) => ({
      balanceCents: cents((budget.balanceCents ?? 0) + by(facts, statement)),
    }));
    const found = check(changed(at, wrong, facts), at, 'budgetChain:');
    expect(found.verdict).toBe('differs');
    expect(found.cause).toContain(words);
    expect(found.cause).not.toContain('Any one of these');
  });

  test('names the settlement that was not taken off', () => {
    const facts = onBudget(buildHousehold(), (month) => (month === at ? SETTLING : PLAIN));
    const wrong = withBudget((budget) => ({ balanceCents: cents((budget.balanceCents ?? 0) - 2310) }));
    expect(check(changed(at, wrong, facts), at, 'budgetChain:').cause).toBe(
      'The settlement of −$23.10 was not taken off it.',
    );
  });

  test('says the sum where no mistake that is tried gives the printed balance', () => {
    const wrong = withBudget((budget) => ({ balanceCents: cents((budget.balanceCents ?? 0) + 77) }));
    expect(check(changed(at, wrong, plain()), at, 'budgetChain:').cause).toMatch(
      /carried \+ .* of charges − \$118\.00 comes to/,
    );
    const settling = onBudget(buildHousehold(), (month) => (month === at ? SETTLING : PLAIN));
    expect(check(changed(at, wrong, settling), at, 'budgetChain:').cause).toContain('settled comes to');
  });

  test('names every mistake where several give the printed cents', () => {
    // The last balance and the budget amount are the same sum: left out, either gives the same.
    const facts = plain();
    const same = changed(
      1,
      withBudget(() => ({ balanceCents: cents(-11_800) })),
      facts,
    );
    const charges = chargesOf(same.statements[2]);
    const wrong = changed(
      2,
      withBudget(() => ({ balanceCents: cents(charges - 11_800) })),
      same,
    );
    expect(check(wrong, 2, 'budgetChain:').cause).toMatch(/^Any one of these gives exactly what is printed: .* Or: /);
  });
});

describe('a budget balance that cannot be followed', () => {
  test('has nothing to compare on the first statement, or where one does not print it', () => {
    expect(check(plain(), 0, 'budgetChain:')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'No earlier statement prints a budget balance to go on from.',
    });
    const unprinted = changed(
      1,
      withBudget(() => ({ balanceCents: null })),
      plain(),
    );
    expect(check(unprinted, 1, 'budgetChain:').cause).toBe('The statement prints no budget balance.');
    expect(check(unprinted, 2, 'budgetChain:').cause).toBe(
      'No earlier statement prints a budget balance to go on from.',
    );
  });

  test('begins at nothing where the plan begins', () => {
    const facts = onBudget(buildHousehold(), (at) => (at === 0 ? { instalment: null } : PLAIN));
    expect(check(facts, 1, 'budgetChain:').verdict).toBe('agrees');
    expect(checksOf(facts, 0).some((one) => one.check === 'budgetChain')).toBe(false);
  });

  test('says nothing of a balance that was there before its figures were kept', () => {
    const facts = onBudget(buildHousehold(), (at) => (at === 0 ? { instalment: null } : PLAIN));
    const older = withBudget((budget) => ({ balanceCents: cents((budget.balanceCents ?? 0) - 6412) }));
    expect(check(changed(1, older, facts), 1, 'budgetChain:')).toMatchObject({
      verdict: 'nothing-to-compare',
      advice: 'Add the budget amount and balance to the earlier statement.',
    });
  });

  test('is asked after where the plan ends with a balance, by the statement’s day or its last', () => {
    const facts = onBudget(buildHousehold(), (at) => (at === 2 ? { instalment: null } : PLAIN));
    expect(check(facts, 2, 'budgetChain:').cause).toMatch(
      /left a budget balance of .*; this one is on no budget plan\.$/,
    );
    const undated = changed(1, (statement) => ({ ...statement, statementOn: null }), facts);
    expect(check(undated, 2, 'budgetChain:').verdict).toBe('nothing-to-compare');
    for (const balanceCents of [null, cents(0)]) {
      const even = changed(
        1,
        withBudget(() => ({ balanceCents })),
        facts,
      );
      expect(checksOf(even, 2).some((one) => one.check === 'budgetChain')).toBe(false);
    }
  });

  test('stands by the whole statement where its cycle is split at switch-on; its due is not judged', () => {
    const facts = plain();
    const from = facts.statements[0]?.from ?? day('2026-01-01');
    const switchOn = day(`${from.slice(0, 8)}20`);
    const split = { ...facts, house: { ...facts.house, switchOn } };
    expect(check(split, 0, 'linesAddUp:').verdict).toBe('agrees');
    expect(check(split, 0, 'amountDue:').verdict).toBe('nothing-to-compare');
    expect(check(split, 1, 'budgetChain:').verdict).toBe('agrees');
  });
});

describe('whatever else the bill carries', () => {
  const months = fc.array(
    fc.record({
      instalment: fc.option(fc.integer({ min: 0, max: 40_000 }), { nil: null }),
      settled: fc.integer({ min: -20_000, max: 20_000 }),
      services: fc.dictionary(
        fc.constantFrom('Water', 'Sewer', 'Refuse', 'Late fee', 'Deposit', 'Tax on water', 'Donation'),
        fc.integer({ min: -9999, max: 99_999 }),
      ),
    }),
    { minLength: 3, maxLength: 3 },
  );

  test('bill avoided never changes with it, and the bill still adds up', () => {
    const bare = buildHousehold();
    // The two sides of each bill avoided, without the books and the projection, which ask nothing more of a statement.
    const sides = (facts: HouseholdFacts) =>
      assembleCycles(facts).cycles.map(({ cycle }) => ({
        asItWas: cycle.asItWas.amountCents,
        withoutRoof: cycle.withoutRoof?.amountCents,
        differs: cycle.checks.filter((one) => one.verdict === 'differs').map((one) => one.key),
      }));
    const expected = sides(bare);
    fc.assert(
      fc.property(months, (chosen) => {
        expect(sides(onBudget(bare, (at) => chosen[at] ?? PLAIN))).toEqual(expected);
      }),
      { numRuns: Math.ceil(PROPERTY_RUNS / 4) },
    );
  }, 120_000);
});
