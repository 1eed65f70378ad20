import { describe, expect, it } from 'vitest';
import type { LeaseFacts } from '#shared/facts/finance.ts';
import { carbonOf } from '#shared/position/carbon.ts';
import { handbookOf } from '#shared/position/handbook.ts';
import { projectFrom } from '#shared/position/project.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { wh } from '#shared/units/energy.ts';
import { exact } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { figureWords, handbookRows, plainWords } from '#src/features/position/outlook-words.ts';
import { everyWorking } from '#tests/support/every-working.ts';
import { assuming, BUILT_START, builtLedger } from './built-basis.ts';

const built = builtLedger();

function handbook({ ledger, basis }: Pick<typeof built, 'ledger' | 'basis'>) {
  const made = handbookOf({ basis, points: ledger.position.points, entries: ledger.entries });
  if (made === null) throw new Error('there are no handbook figures');
  return made;
}

function listOf(
  figure: { working: { inputs: { name: string; value: string | string[] }[] } } | null,
  name: string,
): number[] {
  const value = figure?.working.inputs.find((input) => input.name === name)?.value ?? [];
  return (Array.isArray(value) ? value : [value]).map((text) => Math.round(Number(text) * 100));
}

describe('the handbook figures', () => {
  it('come each to exactly what their working says', () => {
    const made = handbook(built);
    const worked = everyWorking(made);
    expect(worked.length).toBe(10);
    expect(worked.filter((one) => !one.agrees)).toEqual([]);
  });

  it('as bought, add over the years to the position at the horizon with what is owed to lenders then paid', () => {
    const made = handbook(built);
    const projected = projectFrom(built.basis);
    if (!projected.ok) throw new Error(projected.why);
    const last = projected.projection.months.at(-1);
    const flows = listOf(made.asBought.netPresentValue, 'flows');
    expect(flows).toHaveLength(made.years + 1);
    const [, flowInput] = made.asBought.netPresentValue.working.inputs;
    expect(flowInput?.label).toBe(`Kept or received less paid, as bought, year 0 to ${made.years}`);
    expect(sumCents(flows.map(cents))).toBe((last?.cashSoFarCents ?? 0) + (last?.loanPayoffCents ?? 0));
  });

  it('pay at the horizon what a loan that runs on still owes', () => {
    const short = { ledger: built.ledger, basis: assuming(built.basis, { horizonMonths: 24 }) };
    const projected = projectFrom(short.basis);
    if (!projected.ok) throw new Error(projected.why);
    const last = projected.projection.months.at(-1);
    expect(last?.loanPayoffCents).toBeLessThan(0);
    const flows = listOf(handbook(short).asBought.netPresentValue, 'flows');
    expect(sumCents(flows.map(cents))).toBe((last?.cashSoFarCents ?? 0) + (last?.loanPayoffCents ?? 0));
  });

  it('as if cash, have the principal less the dealer fee at the start and no payment to the lender after it', () => {
    const made = handbook(built);
    const loan = built.facts.loan;
    if (!loan || !made.asCash) throw new Error('the built household has a loan');
    const bought = listOf(made.asBought.netPresentValue, 'flows');
    const cash = listOf(made.asCash.netPresentValue, 'flows');
    const paid = built.ledger.entries.filter((entry) => entry.book === 'loan' && entry.cycle === 'before');
    const before = sumCents(paid.map((entry) => entry.amountCents));
    expect(cash[0]).toBe((bought[0] ?? 0) - before - (loan.principalCents - loan.dealerFeeCents));
    const costs = listOf(made.asCash.costPerKwh, 'costs');
    const credit = built.ledger.entries.filter((entry) => entry.book === 'credit');
    expect(credit.length).toBeGreaterThan(0);
    // Cash costs less over the life than the same roof with interest.
    expect(sumCents(costs.map(cents))).toBeGreaterThan(sumCents(listOf(made.asBought.costPerKwh, 'costs').map(cents)));
  });

  it('have no second column without a loan, and keep a lease’s payments in both', () => {
    const lease: LeaseFacts = {
      kind: 'lease',
      company: '',
      firstPaymentOn: BUILT_START,
      termMonths: 240,
      monthlyCents: cents(9_000),
      ratePerKwh: null,
      yearlyRise: '0.02',
      documentId: null,
    };
    const leased = builtLedger({ bare: true }, (facts) => ({ ...facts, lease }));
    expect(handbook(leased).asCash).toBeNull();
    const both = builtLedger({}, (facts) => ({ ...facts, lease }));
    const made = handbook(both);
    const plainCash = handbook(built).asCash;
    const withLease = listOf(made.asCash?.netPresentValue ?? null, 'flows');
    const without = listOf(plainCash?.netPresentValue ?? null, 'flows');
    expect((without[1] ?? 0) - (withLease[1] ?? 0)).toBe(12 * 9_000);
  });

  it('count the other loans that paid for the roof like the solar loan', () => {
    const { loan } = built.facts;
    if (!loan) throw new Error('the built household has a loan');
    const second = {
      id: 'second',
      kind: 'homeEquity' as const,
      loan: { ...loan, principalCents: cents(500_000), dealerFeeCents: cents(0) },
    };
    const both = handbook(builtLedger({}, (facts) => ({ ...facts, otherLoans: [second] })));
    const cash = listOf(both.asCash?.netPresentValue ?? null, 'flows');
    expect((listOf(handbook(built).asCash?.netPresentValue ?? null, 'flows')[0] ?? 0) - (cash[0] ?? 0)).toBe(500_000);
    const only = handbook(builtLedger({ bare: true }, (facts) => ({ ...facts, otherLoans: [second] })));
    expect(only.asCash).not.toBeNull();
  });

  it('give no payback or rate where the sums give none, and say so in words', () => {
    const poor = builtLedger({ bare: true }, (facts) => ({
      ...facts,
      costs: [
        {
          id: 'dear',
          on: BUILT_START,
          kind: 'signing',
          label: 'Dear',
          amountCents: cents(99_000_000),
          documentId: null,
          every: null,
          until: null,
        },
      ],
    }));
    const { asBought, asCash } = handbook(poor);
    expect(asCash).toBeNull();
    expect([asBought.simplePayback, asBought.discountedPayback]).toEqual([null, null]);
    expect(figureWords(asBought, 'simplePayback')).toBeNull();
    expect(handbookRows('0.03').map((row) => row.key)).toEqual([
      'simplePayback',
      'discountedPayback',
      'rateOfReturn',
      'netPresentValue',
      'costPerKwh',
    ]);
  });

  it('have no cost per kWh without production to come or on record', () => {
    const dark = {
      ...built.basis,
      cycles: built.basis.cycles.map((cycle) => ({ ...cycle, productionWh: wh(0) })),
    };
    expect(handbook({ ledger: built.ledger, basis: dark }).asBought.costPerKwh).toBeNull();
  });

  it('estimate the production of a cycle that has none, and say how many', () => {
    const gap = {
      ...built.basis,
      cycles: built.basis.cycles.map((cycle, at) => (at === 20 ? { ...cycle, productionWh: null } : cycle)),
    };
    const made = handbook({ ledger: built.ledger, basis: gap });
    expect(made.estimatedCycles).toBe(1);
    const whole = handbook(built);
    const kWh = (figure: typeof made) =>
      listOf(figure.asBought.costPerKwh, 'production').reduce((sum, one) => sum + one, 0);
    expect(Math.abs(kWh(made) / kWh(whole) - 1)).toBeLessThan(0.005);
  });

  it('are none while nothing can be projected', () => {
    const plans = built.basis.facts.plans.map((one) => ({ ...one, plan: { ...one.plan, timeZone: 'Nowhere' } }));
    const basis = { ...built.basis, facts: { ...built.basis.facts, plans } };
    expect(handbookOf({ basis, points: built.ledger.position.points, entries: built.ledger.entries })).toBeNull();
    expect(handbookOf({ basis: built.basis, points: [], entries: [] })).toBeNull();
  });

  it('are shown in their units', () => {
    const working = { words: '', formula: '0', inputs: [], basis: 'estimated' as const };
    expect(plainWords({ value: '8.25', working: { ...working, unit: 'years' } })).toBe('8.25 years');
    expect(plainWords({ value: '0.1093', working: { ...working, unit: 'fraction' } })).toBe('10.93%');
    expect(plainWords({ value: '0.151', working: { ...working, unit: 'USD/kWh' } })).toBe('$0.1510');
    expect(plainWords({ value: '1', working: { ...working, unit: 'USD/kWh' } })).toBe('$1.0000');
    expect(plainWords({ value: '10125', working: { ...working, unit: 'kg' } })).toBe('10,125 kg');
    const { asBought } = handbook(built);
    expect(figureWords(asBought, 'netPresentValue')).toMatch(/^\u2212?\$[\d,]+\.\d\d$/);
    expect(figureWords(asBought, 'simplePayback')).toMatch(/ years$/);
  });
});

describe('carbon not emitted', () => {
  it('is production × pounds per MWh × 0.45359237, in whole kilograms, with the factor’s basis and year in its working', () => {
    const made = carbonOf(built.basis);
    const kWh = built.basis.cycles.reduce((sum, cycle) => sum + (cycle.productionWh ?? 0), 0) / 1000;
    expect(made.toDate?.value).toBe(String(Math.round((kWh * 823.149 * 0.45359237) / 1000)));
    for (const figure of [made.toDate, made.projected]) {
      if (!figure) throw new Error('no figure');
      expect(evaluateWorking(figure.working).eq(exact(figure.value))).toBe(true);
      expect(figure.working.inputs.find((input) => input.name === 'factor')?.label).toBe(
        'United States, total output, 2022',
      );
    }
    expect(made.projected?.working.basis).toBe('estimated');
  });

  it('is exactly 453.59237 kg for a thousand pounds (NIST SP 811, from memory: the pound is 0.45359237 kg)', () => {
    const basis = {
      ...built.basis,
      cycles: built.basis.cycles
        .slice(0, 1)
        .map((cycle) => ({ ...cycle, productionWh: built.basis.cycles[0]?.productionWh ?? null })),
    };
    const [cycle] = basis.cycles;
    if (!cycle || cycle.productionWh === null) throw new Error('no production');
    const lbPerMwh = '1000';
    const { grid } = basis.facts.assumptions;
    const made = carbonOf(assuming(basis, { grid: { ...grid, lbPerMwh } }));
    expect(made.toDate?.value).toBe(String(Math.round((cycle.productionWh / 1_000_000) * 453.59237)));
  });

  it('leaves out a cycle without production and says so; without any there is no figure', () => {
    const gap = {
      ...built.basis,
      cycles: built.basis.cycles.map((cycle, at) => (at < 2 ? { ...cycle, productionWh: null } : cycle)),
    };
    expect(carbonOf(gap).missingCycles).toBe(2);
    expect(Number(carbonOf(gap).toDate?.value)).toBeLessThan(Number(carbonOf(built.basis).toDate?.value));
    const none = { ...built.basis, cycles: built.basis.cycles.map((cycle) => ({ ...cycle, productionWh: null })) };
    expect(carbonOf(none)).toMatchObject({ toDate: null, projected: null, missingCycles: 26 });
  });

  it('runs over the months projected', () => {
    const half = Number(carbonOf(assuming(built.basis, { horizonMonths: 150 })).projected?.value);
    const whole = Number(carbonOf(built.basis).projected?.value);
    expect(half).toBeGreaterThan(whole / 2);
    expect(half).toBeLessThan(whole);
  });
});
