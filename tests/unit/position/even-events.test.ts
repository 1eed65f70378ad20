import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { escalatePlan, escalateRate } from '#shared/position/escalate.ts';
import { firstCrossing, lastingCrossing } from '#shared/position/even.ts';
import { positionEvents } from '#shared/position/events.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { day } from '#shared/units/day.ts';
import { creditOf, incentiveOf, loanOf, mortgageOf } from '../books/facts.ts';

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

  it('are none for a household without money facts', () => {
    expect(
      positionEvents({ plans: [], loan: null, mortgage: null, credit: null, incentive: null }, day('2026-12-01')),
    ).toEqual([]);
  });
});

describe('prices to come', () => {
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
