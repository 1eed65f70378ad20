import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { escalatePlan, escalateRate } from '#shared/position/escalate.ts';
import { firstCrossing, lastingCrossing } from '#shared/position/even.ts';
import { positionEvents } from '#shared/position/events.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { creditOf, creditYear, incentiveOf, loanOf, mortgageOf, paymentOf } from '../books/facts.ts';

const FLAT: RatePlanInput = {
  timeZone: 'America/New_York',
  netting: 'none',
  charges: [
    { id: 'energy', label: 'Energy', kind: 'import', basis: 'import', rates: [{ from: '2024-01-01', rate: '0.1684' }] },
    {
      id: 'customer',
      label: 'Customer charge',
      kind: 'fixed',
      basis: 'cycle',
      rates: [{ from: '2024-01-01', rate: '14.50' }],
    },
    {
      id: 'tax',
      label: 'Tax',
      kind: 'tax',
      basis: 'percent',
      on: ['energy'],
      rates: [{ from: '2024-01-01', rate: '0.031' }],
    },
  ],
  credits: [
    {
      id: 'sold',
      label: 'Export',
      kind: 'export',
      basis: 'export',
      to: 'bill',
      rates: [{ from: '2024-01-01', rate: '0.095' }],
    },
    {
      id: 'reward',
      label: 'Incentive',
      kind: 'incentive',
      basis: 'production',
      to: 'separate',
      rates: [{ from: '2024-01-01', rate: '0.045' }],
    },
  ],
};

describe('even', () => {
  it('is the lasting crossing and not the first touch', () => {
    expect(lastingCrossing([-5, 3, -1, 0, 4])).toBe(3);
    expect(firstCrossing([-5, 3, -1, 0, 4])).toBe(1);
    expect(firstCrossing([-5, 0])).toBe(1);
    expect(firstCrossing([-5, -1])).toBeNull();
  });

  it('is the beginning when it never was below, and nowhere when it ends below', () => {
    expect(lastingCrossing([0, 1])).toBe(0);
    expect(lastingCrossing([1, -1])).toBeNull();
    expect(lastingCrossing([])).toBeNull();
  });

  it('leaves nothing below zero after it, and something below just before it', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 1 }), (values) => {
        const index = lastingCrossing(values);
        expect(values.slice(index ?? values.length).every((value) => value >= 0)).toBe(true);
        if (index !== 0) expect(values[(index ?? values.length) - 1]).toBeLessThan(0);
      }),
    );
  });
});

describe('the events', () => {
  it('are in order of their dates, past and to come, each named', () => {
    const plan = ratePlanSchema.parse(FLAT);
    const events = positionEvents(
      {
        plans: [
          { from: day('2026-06-01'), plan, withoutRoof: null },
          { from: day('2024-01-01'), plan, withoutRoof: null },
        ],
        loan: loanOf(),
        mortgage: mortgageOf(),
        credit: creditOf(),
        incentive: incentiveOf(),
      },
      day('2026-12-01'),
    );
    expect(events.map((event) => [event.on, event.label, event.projected])).toEqual([
      ['2025-03-28', 'Tax credit, first part', false],
      ['2025-09-01', 'Mortgage insurance off', false],
      ['2026-03-02', 'Tax credit, second part', false],
      ['2026-06-01', 'New rate plan', false],
      ['2027-04-15', 'Tax credit, last part', true],
      ['2033-01-09', 'Incentive ends', true],
      ['2034-12-01', 'Insurance would have ended', true],
      ['2044-06-15', 'Loan paid off', true],
    ]);
  });

  const none = { plans: [], loan: null, mortgage: null, credit: null, incentive: null };
  const labels = (facts: Partial<Parameters<typeof positionEvents>[0]>) =>
    positionEvents({ ...none, ...facts }, day('2026-12-01')).map((event) => event.label);

  it('name every part of a credit that comes over many returns, and none where it comes whole', () => {
    const whole = creditOf({ years: [creditYear(2024, 2_000_000, { filedOn: day('2025-03-10'), status: 'filed' })] });
    expect(labels({ credit: whole })).toEqual(['Tax credit']);
    const years = Array.from({ length: 8 }, (_, at) => creditYear(2024 + at, 100_000, {}));
    expect(labels({ credit: creditOf({ years }) })).toEqual([
      'Tax credit, first part',
      'Tax credit, second part',
      'Tax credit, third part',
      'Tax credit, fourth part',
      'Tax credit, fifth part',
      'Tax credit, sixth part',
      'Tax credit, 7th part',
      'Tax credit, last part',
    ]);
  });

  it('on one day stand as the books do', () => {
    const facts = { loan: loanOf(), incentive: incentiveOf({ lastDay: day('2044-06-15') }) };
    expect(labels(facts)).toEqual(['Loan paid off', 'Incentive ends']);
  });

  it('do not say that insurance would have ended where it had ended by then, nor speak of insurance the roof did not end', () => {
    expect(labels({ mortgage: mortgageOf({}, { removedOn: day('2034-12-01') }) })).toEqual(['Mortgage insurance off']);
    expect(labels({ mortgage: mortgageOf({}, { removedOn: day('2034-11-30') }) })).toHaveLength(2);
    expect(labels({ mortgage: mortgageOf({}, { removedOn: null }) })).toEqual([]);
    expect(labels({ mortgage: mortgageOf({}, { becauseOfRoof: false }) })).toEqual([]);
  });

  it('have no end of a loan that its record never ends', () => {
    const payments = Array.from({ length: 601 }, (_, month) => paymentOf(addMonths(day('2024-07-15'), month), 0));
    expect(labels({ loan: loanOf({ termMonths: 1, payments }) })).toEqual([]);
  });

  it('tell of a day that is today as of what has come', () => {
    const on = (today: string) =>
      positionEvents({ ...none, incentive: incentiveOf({ lastDay: day('2033-01-09') }) }, day(today))[0]?.projected;
    expect([on('2033-01-08'), on('2033-01-09')]).toEqual([true, false]);
  });

  it('are none for a household without money facts', () => {
    expect(
      positionEvents({ plans: [], loan: null, mortgage: null, credit: null, incentive: null }, day('2026-12-01')),
    ).toEqual([]);
  });
});

describe('prices to come', () => {
  const TRUED: RatePlanInput = {
    ...FLAT,
    banks: [
      {
        id: 'kwh',
        label: 'Bank',
        unit: 'kWh',
        trueUps: [
          { at: { months: [4] }, action: 'pay', rates: [{ from: '2024-01-01', rate: '0.04' }] },
          { at: 'finalBill', action: 'expire' },
        ],
      },
    ],
  };

  it('raise what a true-up pays; where it pays nothing there is nothing to raise', () => {
    const [bank] = escalatePlan(ratePlanSchema.parse(TRUED), '0.10', 2).banks;
    expect(bank?.trueUps.map((trueUp) => trueUp.rates?.[0]?.rate ?? null)).toEqual(['0.0484', null]);
  });

  it('leave the very plan where nothing rises, and give the same plan back for the same rise', () => {
    const plan = ratePlanSchema.parse(FLAT);
    expect(escalatePlan(plan, '0.10', 0)).toBe(plan);
    expect(escalatePlan(plan, '0.00', 3)).toBe(plan);
    const risen = escalatePlan(plan, '0.10', 3);
    expect(escalatePlan(plan, '0.10', 3)).toBe(risen);
    expect(escalatePlan(plan, '0.10', 4)).not.toBe(risen);
    expect(escalatePlan(ratePlanSchema.parse(FLAT), '0.10', 3)).not.toBe(risen);
  });

  it('are the same however many rises have been tried, of which only the latest are kept', () => {
    const plan = ratePlanSchema.parse(FLAT);
    const tried = (count: number) => {
      for (let at = 0; at < count; at += 1) escalatePlan(plan, `0.${String(1000 + at)}`, 1);
    };
    const first = escalatePlan(plan, '0.05', 1);
    tried(119);
    expect(escalatePlan(plan, '0.05', 1)).toBe(first);
    tried(121);
    expect(escalatePlan(plan, '0.05', 1)).not.toBe(first);
    expect(escalatePlan(plan, '0.05', 1)).toEqual(first);
  });

  it('rise by the year and are rounded half up', () => {
    expect(escalateRate('0.21400', '0.025', 1, 5)).toBe('0.21935');
    expect(escalateRate('0.1684', '0.025', 2)).toBe('0.176925');
  });

  it('raise charges and export credits, and leave percentages and a contracted incentive', () => {
    const raised = escalatePlan(ratePlanSchema.parse(FLAT), '0.10', 1);
    const rates = [...raised.charges, ...raised.credits].map((item) => [item.id, item.rates?.[0]?.rate]);
    expect(rates).toEqual([
      ['energy', '0.18524'],
      ['customer', '15.95'],
      ['tax', '0.031'],
      ['sold', '0.1045'],
      ['reward', '0.045'],
    ]);
  });
});
