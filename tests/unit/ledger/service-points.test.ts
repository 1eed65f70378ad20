import { describe, expect, test } from 'vitest';
import type { Aggregation, MeterFacts } from '#shared/facts/house.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedBank, Statement } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { assembleCycles } from '#shared/ledger/cycles.ts';
import { cents } from '#shared/units/cents.ts';
import { serviceLine } from '#tests/support/budget-household.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

const BARN: MeterFacts = {
  id: 'barn',
  label: 'Barn meter',
  channels: ['import'],
  dials: 5,
  multiplier: '1',
  servicePoint: 'Barn',
};
const BARN_KWH = 100;

/** The built house with a meter on the barn, read on the same statements. */
function withBarn(
  aggregation: Aggregation,
  change: (statement: Statement, at: number) => Statement = (one) => one,
): HouseholdFacts {
  const facts = buildHousehold({ intervals: { channels: ['import', 'export'], minutes: 1440 } });
  const statements = facts.statements.map((statement, at): Statement => {
    const read = {
      meter: 'barn',
      channel: 'import' as const,
      from: statement.from,
      to: statement.to,
      previous: String(500 + at * BARN_KWH),
      current: String(500 + (at + 1) * BARN_KWH),
      dials: 5,
      multiplier: '1',
      type: 'actual' as const,
      row: null,
    };
    return change({ ...statement, reads: [...statement.reads, read], importWh: null }, at);
  });
  return { ...facts, statements, house: { ...facts.house, aggregation, meters: [...facts.house.meters, BARN] } };
}

const compute = (facts: HouseholdFacts) => computeLedger(facts, { today: BUILT_TODAY });
const cyclesOf = (facts: HouseholdFacts) => assembleCycles(facts).cycles.map((one) => one.cycle);
const differing = (facts: HouseholdFacts) =>
  cyclesOf(facts).map((cycle) => cycle.checks.filter((one) => one.verdict === 'differs').map((one) => one.key));
const importOf = (facts: HouseholdFacts) => cyclesOf(facts).map((cycle) => cycle.energy.import?.wh ?? 0);

describe('a meter that serves another place', () => {
  test('billed by itself: its reads are kept and kept apart', () => {
    const facts = withBarn('none');
    expect(importOf(facts)).toEqual(importOf(buildHousehold()));
    expect(differing(facts)).toEqual([[], [], []]);
    const rows = cyclesOf(facts)[1]?.meters ?? [];
    expect(rows.map((one) => [one.meter, one.servicePoint, one.counted, one.figure.wh])).toEqual([
      ['net', null, true, importOf(facts)[1]],
      ['barn', 'Barn', false, BARN_KWH * 1000],
    ]);
  });

  test('billed by itself: its lines stand with the other services, out of the bill avoided', () => {
    const barnBill = serviceLine('Barn, electricity and customer charge', 3134);
    const facts = withBarn('none', (statement, at) =>
      at === 2
        ? {
            ...statement,
            lines: [...statement.lines, barnBill],
            amountDueCents: cents(statement.amountDueCents + 3134),
          }
        : statement,
    );
    expect(differing(facts)).toEqual([[], [], []]);
    const avoided = (of: HouseholdFacts) =>
      compute(of)
        .entries.filter((entry) => entry.book === 'billAvoided')
        .map((entry) => entry.amountCents);
    expect(avoided(facts)).toEqual(avoided(buildHousehold()));
  });

  test('netted together: its kWh are in the import that is settled; the interval file is no witness of them', () => {
    const facts = withBarn('netTogether');
    expect(importOf(facts)).toEqual(importOf(buildHousehold()).map((wh) => wh + BARN_KWH * 1000));
    const cycle = cyclesOf(facts)[1];
    // Billed without the barn, as the built statement is: the missing kWh show.
    expect(cycle?.checks.find((one) => one.key === 'amountDue:')?.verdict).toBe('differs');
    expect(cycle?.checks.find((one) => one.key === 'importAgainstIntervals:')?.title).toBe(
      'Import, billed against the meter reads',
    );
    expect(everyWorking(compute(facts)).filter((one) => !one.agrees)).toEqual([]);
  });
});

describe('a share of the surplus sent to another place', () => {
  const SENT = '10.00';
  /** The second month sends ten dollars of the bank away; the bank closes, and the next opens, by so much lower. */
  function sharing(bank: Partial<PrintedBank> = {}): HouseholdFacts {
    return withBarn('share', (statement, at) => {
      const lower = (text: string | null) => (text === null ? null : (Number(text) - 10).toFixed(2));
      const banks = statement.banks.map((one) => {
        if (at === 1) return { ...one, close: lower(one.close), sentOut: SENT, ...bank };
        return at === 2 ? { ...one, open: lower(one.open), close: lower(one.close) } : one;
      });
      return { ...statement, banks };
    });
  }

  test('lowers the close by what was sent, and the chain goes on from there', () => {
    const facts = sharing();
    const [, second, third] = cyclesOf(facts);
    const chain = (cycle: typeof second) =>
      cycle?.checks.filter((one) => one.check === 'bankChain').map((one) => one.verdict);
    expect(chain(second)).toEqual(['agrees', 'agrees']);
    expect(third?.checks.find((one) => one.key === 'bankChain:creditBank')?.verdict).toBe('agrees');
    expect(second?.sentOut).toEqual([{ bank: 'creditBank', unit: 'USD', amount: SENT, valueCents: null }]);
    const [bank] = second?.settlement?.banks ?? [];
    const { open, earned, used, expired, paid, close } = bank?.move ?? {};
    const closes = [earned, `-${used}`, `-${expired}`, `-${paid}`, `-${SENT}`].reduce(
      (sum, text) => sum + Math.round(Number(text) * 100),
      Math.round(Number(open) * 100),
    );
    expect(Math.round(Number(close) * 100)).toBe(closes);
  });

  test('differs where the bank closes lower and nothing says that credit was sent', () => {
    const second = cyclesOf(sharing({ sentOut: null }))[1];
    expect(second?.checks.find((one) => one.key === 'bankChain:creditBank.close')).toMatchObject({
      verdict: 'differs',
      difference: '-10',
    });
  });

  test('is worth nothing here until the owner states what it saved there; then it posts as an entry of its own', () => {
    const silent = compute(sharing());
    const stated = compute(sharing({ sentValueCents: cents(945) }));
    expect(silent.entries.some((entry) => entry.kind === 'sharedCredit')).toBe(false);
    const own = stated.entries.filter((entry) => entry.kind === 'sharedCredit');
    expect(own.map((entry) => [entry.book, entry.basis, entry.amountCents, entry.working.words])).toEqual([
      ['billAvoided', 'avoided', 945, '$9.45 as printed on the other bill'],
    ]);
    expect(own[0]?.cycle).toBe(stated.cycles[1]?.to);
    expect(stated.position.cashSoFar.amountCents - silent.position.cashSoFar.amountCents).toBe(945);
    expect(everyWorking(stated).filter((one) => !one.agrees)).toEqual([]);
  });
});
