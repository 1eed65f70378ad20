import { describe, expect, it } from 'vitest';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import {
  carriedInValues,
  costValues,
  readCarriedIn,
  readCost,
  readYear,
  yearValues,
} from '#src/features/credit/credit-values.ts';
import {
  premiumsValues,
  readAppraisal,
  readBalance,
  readEnd,
  readPremiums,
  readRecord,
  recordValues,
} from '#src/features/money/insurance-values.ts';
import type { Reading } from '#src/lib/form.ts';
import { creditOf, mortgageOf } from '../books/facts.ts';

const paths = (reading: Reading<unknown>) => (reading.ok ? [] : reading.faults.map(({ path }) => path));

describe('the forms of the tax credit', () => {
  it('give back every year, cost and carryforward as it was', () => {
    const credit = creditOf({ carriedIn: { taxYear: 2023, amountCents: cents(123_400) } });
    for (const year of credit.years) {
      const { taxYear, typedBy: _, ...body } = year;
      expect(readYear(yearValues(year, 0))).toEqual({ ok: true, body: { taxYear, body } });
    }
    for (const cost of credit.costs) {
      const { placedInServiceOn, documentId } = cost;
      expect(readCost(costValues(cost))).toEqual({ ok: true, body: { placedInServiceOn, documentId } });
    }
    expect(readCarriedIn(carriedInValues(credit))).toEqual({ ok: true, body: { carriedIn: credit.carriedIn } });
    expect(readCarriedIn(carriedInValues(creditOf()))).toEqual({ ok: true, body: { carriedIn: null } });
  });

  it('name the field that cannot be read', () => {
    const blank = yearValues(null, 2026);
    expect(paths(readYear({ ...blank, taxYear: '26', limitCents: '-1' }))).toEqual(['taxYear', 'limitCents']);
    expect(paths(readYear({ ...blank, status: 'filed' }))).toEqual(['filedOn', 'limitCents']);
    expect(paths(readCarriedIn({ has: 'yes', taxYear: '', amountCents: 'x' }))).toEqual(['taxYear', 'amountCents']);
    expect(paths(readCost({ placedInServiceOn: '2024-02-30', documentId: '' }))).toEqual(['placedInServiceOn']);
  });
});

describe('the forms of mortgage insurance', () => {
  it('give back the record and the premiums as they were', () => {
    const facts = mortgageOf({
      latePayments: { thirtyIn12: 1, sixtyIn24: 0 },
      otherLien: true,
      requestedOn: day('2026-05-04'),
      premiums: [{ from: day('2026-01-01'), premiumMonthlyCents: cents(12_050) }],
    });
    const { latePayments, units, occupancy, otherLien, requestedOn, premiums } = facts;
    expect(readRecord(recordValues(facts))).toEqual({
      ok: true,
      body: { latePayments, units, occupancy, otherLien, requestedOn },
    });
    expect(readPremiums(premiumsValues(facts))).toEqual({ ok: true, body: { premiums } });
    const unstated = readRecord(recordValues(mortgageOf()));
    expect(unstated).toMatchObject({ ok: true, body: { latePayments: null, otherLien: null, requestedOn: null } });
  });

  it('name the field that cannot be read', () => {
    expect(paths(readAppraisal({ on: '', valueCents: '0', how: 'appraisal', documentId: '' }))).toEqual([
      'on',
      'valueCents',
    ]);
    expect(paths(readBalance({ on: '2026-13-01', balanceCents: '-3', documentId: '' }))).toEqual([
      'on',
      'balanceCents',
    ]);
    expect(paths(readEnd({ endRule: 'appreciation', appreciationOn: '' }))).toEqual(['appreciationOn']);
    const late = { ...recordValues(mortgageOf()), late: 'some' as const, thirtyIn12: '13', sixtyIn24: '' };
    expect(paths(readRecord(late))).toEqual(['thirtyIn12', 'sixtyIn24']);
    const twice = { from: '2026-01-01', premiumMonthlyCents: '90' };
    expect(paths(readPremiums({ premiums: [twice, { ...twice, premiumMonthlyCents: '' }] }))).toEqual([
      'premiums.1.from',
      'premiums.1.premiumMonthlyCents',
    ]);
  });
});
