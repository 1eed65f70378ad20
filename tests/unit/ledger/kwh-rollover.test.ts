import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { ratePlanSchema } from '#shared/settlement/plan.ts';
import { cents } from '#shared/units/cents.ts';
import { BUILT_TODAY, buildHousehold } from '#tests/support/build-household.ts';
import { everyWorking } from '#tests/support/every-working.ts';

/** Import and export, bank before and after, kWh billed, amounts: worked out by hand for a price of $0.1390 and $11.00 a cycle. */
const MONTHS = [
  { importKwh: 300, exportKwh: 400, open: '0', close: '100', billed: 0, energy: 0 },
  { importKwh: 500, exportKwh: 200, open: '100', close: '0', billed: 200, energy: 2780 },
  { importKwh: 333, exportKwh: 0, open: '0', close: '0', billed: 333, energy: 4629 },
];

function rollover(): HouseholdFacts {
  const facts = buildHousehold({
    change: (cycle, at) => ({ ...cycle, importKwh: MONTHS[at]?.importKwh ?? 0, exportKwh: MONTHS[at]?.exportKwh ?? 0 }),
  });
  const from = '2025-01-01';
  const plan = ratePlanSchema.parse({
    timeZone: 'America/New_York',
    netting: 'cycle',
    charges: [
      { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from, rate: '0.1390' }] },
      { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'cycle', rates: [{ from, rate: '11.00' }] },
    ],
    banks: [
      {
        id: 'kwhBank',
        label: 'kWh bank',
        unit: 'kWh',
        offsets: ['energy'],
        trueUps: [{ at: { months: [4] }, action: 'expire' }],
      },
    ],
  });
  const line = (component: string, kind: PrintedLine['kind'], quantity: string, amount: number): PrintedLine => ({
    component: null,
    kind,
    label: component === 'energy' ? 'Energy used' : 'Customer charge',
    quantity,
    unit: component === 'energy' ? 'kWh' : 'cycle',
    rate: null,
    amountCents: cents(amount),
    inDue: true,
    row: null,
  });
  return {
    ...facts,
    plans: [{ from: facts.plans[0]?.from ?? BUILT_TODAY, plan, withoutRoof: null }],
    statements: facts.statements.map((statement, at) => {
      const month = MONTHS[at];
      if (!month) throw new Error('a month is missing');
      return {
        ...statement,
        lines: [line('energy', 'import', String(month.billed), month.energy), line('customer', 'fixed', '1', 1100)],
        banks: [
          {
            bank: 'bank',
            unit: 'kWh',
            open: month.open,
            close: month.close,
            sentOut: null,
            sentValueCents: null,
            row: null,
          },
        ],
        previousBalanceCents: null,
        paymentsCents: null,
        amountDueCents: cents(month.energy + 1100),
      };
    }),
  };
}

describe('a house whose kWh roll over', () => {
  test('balances, line by line, with the bank carried in kWh', () => {
    const ledger = computeLedger(rollover(), { today: BUILT_TODAY });
    expect(ledger.cycles.map((cycle) => cycle.checks.filter((check) => check.verdict === 'differs'))).toEqual([
      [],
      [],
      [],
    ]);
    expect(ledger.cycles.map((cycle) => cycle.state)).toEqual(['balanced', 'balanced', 'balanced']);
    expect(ledger.cycles.map((cycle) => cycle.oursDueCents)).toEqual([1100, 3880, 5729]);
    const close = ledger.cycles[0]?.checks.find((check) => check.key === 'bankChain:kwhBank.close');
    expect([close?.stated, close?.found, close?.unit, close?.verdict]).toEqual(['100', '100', 'kWh', 'agrees']);
  });

  test('counts banked kWh at the energy price they will offset', () => {
    const { position } = computeLedger(rollover(), { today: BUILT_TODAY });
    expect(position.points.map((point) => point.utilityBankCents)).toEqual([0, 1390, 0, 0, 0]);
  });

  test('a month’s excess that was not banked is found by the bank’s close', () => {
    const facts = rollover();
    const statements = facts.statements.map((one, at) =>
      at === 0 ? { ...one, banks: one.banks.map((bank) => ({ ...bank, close: '0' })) } : one,
    );
    const [first] = computeLedger({ ...facts, statements }, { today: BUILT_TODAY }).cycles;
    const differing = first?.checks.filter((check) => check.verdict === 'differs').map((check) => check.key);
    expect(differing).toEqual(['bankChain:kwhBank.close']);
  });

  test('every working beside a figure evaluates to it', () => {
    const found = everyWorking(computeLedger(rollover(), { today: BUILT_TODAY }));
    expect(found.length).toBeGreaterThan(50);
    expect(found.filter((one) => !one.agrees)).toEqual([]);
  });
});
