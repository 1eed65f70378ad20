import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { matchLines } from '#shared/reconcile/match.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, day } from '#shared/units/day.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { CUSTOMER, ENERGY, FLAT, plan } from '#tests/unit/settlement/plans.ts';
import { changed, check } from './built-checks.ts';

describe('a printed line is taken for the plan’s', () => {
  const tax = { id: 'tax', label: 'City tax', kind: 'tax', basis: 'percent', on: ['energy'], rates: FLAT };
  const of = plan({
    charges: [
      { ...ENERGY, label: 'Energy delivered' },
      { ...ENERGY, id: 'peak', label: 'Energy delivered at peak' },
      CUSTOMER,
      { ...CUSTOMER, id: 'meter', label: 'Meter charge' },
      tax,
    ],
  });
  const line = (kind: PrintedLine['kind'], label: string, component: string | null = null): PrintedLine => ({
    component,
    kind,
    label,
    quantity: null,
    unit: null,
    rate: null,
    amountCents: cents(100),
    inDue: true,
    row: null,
  });

  test('by its id, else by the label most alike among those of its kind', () => {
    expect(matchLines([line('import', 'whatever', 'peak')], of)).toEqual(['peak']);
    expect(
      matchLines(
        [line('import', 'Energy delivered at peak'), line('import', 'Energy delivered'), line('fixed', 'Meter charge')],
        of,
      ),
    ).toEqual(['peak', 'energy', 'meter']);
  });

  test('by half of its words at the least', () => {
    // Of two words and two, one is shared; of two and four, one.
    expect(matchLines([line('import', 'Energy used')], of)).toEqual(['energy']);
    expect(matchLines([line('import', 'Energy used this month')], of)).toEqual([null]);
  });

  test('or where it is the only one of its kind and the plan has only one left', () => {
    expect(matchLines([line('tax', '% *')], of)).toEqual(['tax']);
    expect(matchLines([line('tax', 'Levy'), line('tax', 'Surcharge')], of)).toEqual([null, null]);
    expect(matchLines([line('fixed', 'Levy')], of)).toEqual([null]);
    expect(matchLines([line('fixed', 'Customer charge'), line('fixed', 'Levy')], of)).toEqual(['customer', 'meter']);
  });

  test('but never where no rate plan speaks of it', () => {
    expect(matchLines([line('otherService', 'City tax'), line('payment', 'City tax')], of)).toEqual([null, null]);
  });

  test('and labels without a letter are alike to none', () => {
    const signs = plan({
      charges: [
        { ...ENERGY, label: '1' },
        { ...ENERGY, id: 'other', label: '2' },
      ],
    });
    expect(matchLines([line('import', '3')], signs)).toEqual([null]);
  });
});

describe('dates', () => {
  const longer = (days: number, printed: boolean) =>
    changed(2, (s) => ({
      ...s,
      to: addDays(s.to, days),
      printedDays: printed && s.printedDays !== null ? s.printedDays + days : null,
    }));

  test('of an unusual length are the length’s own check, not the printed number’s', () => {
    expect(check(longer(9, true), 2, 'days:')).toMatchObject({ verdict: 'agrees', advice: null });
    expect(check(longer(9, false), 2, 'days:')).toMatchObject({ verdict: 'nothing-to-compare', advice: null });
    expect(check(longer(9, true), 2, 'daysInRange:').verdict).toBe('differs');
  });
});

describe('what a statement does not print is named', () => {
  test('a closing or opening balance of a bank', () => {
    const bare = (part: object) => changed(1, (s) => ({ ...s, banks: s.banks.map((bank) => ({ ...bank, ...part })) }));
    expect(check(bare({ close: null }), 1, 'bankChain:creditBank.close')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'The statement prints no closing balance.',
    });
    expect(check(bare({ open: null }), 1, 'bankChain:creditBank')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'One of the two statements does not print this balance.',
    });
  });

  test('kWh, with what the interval file says beside them', () => {
    const without = (facts: HouseholdFacts) =>
      changed(
        1,
        (s) => ({
          ...s,
          reads: [],
          importWh: null,
          exportWh: null,
          lines: s.lines.map((line) => ({ ...line, quantity: null })),
        }),
        facts,
      );
    const cause = 'The statement gives no import in kWh.';
    expect(check(without(buildHousehold()), 1, 'importAgainstIntervals:')).toMatchObject({ cause, found: null });
    const seen = buildHousehold({ intervals: { channels: ['import'], minutes: 1440 } });
    expect(check(without(seen), 1, 'importAgainstIntervals:')).toMatchObject({ cause, found: '520' });
  });

  test('production reads, with what the monitoring file says beside them', () => {
    const facts = buildHousehold({ intervals: { channels: ['monitor'], minutes: 1440 } });
    const without = changed(
      1,
      (s) => ({ ...s, productionWh: null, reads: s.reads.filter((read) => read.channel !== 'production') }),
      facts,
    );
    expect(check(without, 1, 'productionAgainstMonitor:')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'There is no complete figure from the production meter for this cycle.',
      found: '1450',
    });
  });
});

describe('sums', () => {
  test('a previous balance is the one a line prints, or the one the statement states', () => {
    const printed = (amount: number): PrintedLine => ({
      component: null,
      kind: 'previousBalance',
      label: 'Previous balance',
      quantity: null,
      unit: null,
      rate: null,
      amountCents: cents(amount),
      inDue: true,
      row: null,
    });
    const facts = changed(1, (s) => ({ ...s, lines: [...s.lines, printed(12_345)], previousBalanceCents: null }));
    expect(check(facts, 1, 'balanceChain:').stated).toBe('123.45');
  });

  test('one that nothing came before is nothing to compare', () => {
    const facts = changed(0, (s) => ({ ...s, previousBalanceCents: cents(500) }));
    expect(check({ ...facts, opening: { ...facts.opening, balanceCents: null } }, 0, 'balanceChain:')).toMatchObject({
      verdict: 'nothing-to-compare',
      cause: 'There is no earlier statement to compare with.',
    });
  });

  test('a wrong total without lines says that its cause cannot be found', () => {
    const facts = changed(1, (s) => ({ ...s, lines: [], amountDueCents: cents(s.amountDueCents + 900) }));
    expect(check(facts, 1, 'amountDue:').cause).toBe(
      'The statement’s lines are not entered, so the cause cannot be found.',
    );
  });
});

describe('meters', () => {
  test('a new meter without a final read of the old one is said', () => {
    const facts = changed(1, (s) => ({
      ...s,
      reads: s.reads.map((read) =>
        read.channel === 'import' ? { ...read, meter: 'net2', from: day('2025-07-01') } : read,
      ),
    }));
    expect(check(facts, 1, 'registersFollow:import:net2')).toMatchObject({
      verdict: 'differs',
      found: 'no final read',
      cause: 'Meter net2 is new and the old meter has no final read.',
    });
  });

  test('segments of one meter must meet, in whatever order they are entered', () => {
    const cut = (gap: number) =>
      changed(1, (s) => ({
        ...s,
        reads: s.reads.flatMap((read) => {
          if (read.channel !== 'import') return [read];
          const middle = Number(read.previous) + 200;
          const on = day('2025-08-01');
          return [
            { ...read, from: on, previous: String(middle + gap) },
            { ...read, to: on, current: String(middle) },
          ];
        }),
      }));
    expect(check(cut(0), 1, 'registersFollow:import:net').verdict).toBe('agrees');
    expect(check(cut(3), 1, 'registersFollow:import:net')).toMatchObject({ verdict: 'differs', difference: '3' });
  });
});
