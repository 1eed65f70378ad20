import { describe, expect, it } from 'vitest';
import { creditChecks } from '#shared/books/credit-checks.ts';
import { creditFormOf } from '#shared/books/credit-forms.ts';
import { creditSummary } from '#shared/books/credit-summary.ts';
import { creditLinesOf } from '#shared/books/tax-credit.ts';
import { cents } from '#shared/units/cents.ts';
import { creditOf, creditYear } from './facts.ts';

describe('the form’s line numbers by year', () => {
  it('say which were read on the form and which come from memory', () => {
    expect(creditFormOf(2023)).toMatchObject({ schedule3: '5a', note: null });
    expect(creditFormOf(2025)).toMatchObject({ schedule3: '5a', schedule3Verified: 'form', note: null });
    expect(creditFormOf(2022)).toMatchObject({ schedule3: '5', schedule3Verified: 'memory' });
    expect(creditFormOf(2022).verified).toMatchObject({ line13: 'form', line14: 'memory', line16: 'form' });
    expect(creditFormOf(2024).verified).toMatchObject({ line12: 'memory', line16: 'form' });
  });

  it('are not claimed for a year whose form has not been seen', () => {
    const form = creditFormOf(2026);
    expect(form.note).toContain('not verified');
    expect(form.schedule3).toBeNull();
    expect(new Set(Object.values(form.verified))).toEqual(new Set(['notSeen']));
  });
});

describe('the preparer’s summary', () => {
  it('holds origin, costs, each year with who typed its limit, and the checks', () => {
    const credit = creditOf();
    credit.costs.push({
      id: 'rebate',
      label: 'Utility subsidy',
      amountCents: cents(150_000),
      treatment: 'reduction',
      reason: 'Paid by the utility, not income',
      placedInServiceOn: null,
      documentId: null,
    });
    const summary = creditSummary(credit);
    expect(summary.vintages).toMatchObject([
      { year: 2024, rate: '0.30', grossCents: 3_690_000, reductionCents: 150_000, share: '1' },
    ]);
    expect(summary.vintages[0]?.costs.map((cost) => cost.reason)).toContain('Paid by the utility, not income');
    expect(summary.years.map((year) => [year.taxYear, year.status, year.limitTypedBy])).toEqual([
      [2024, 'filed', 'Priya'],
      [2025, 'filed', 'Priya'],
      [2026, 'planned', 'Priya'],
    ]);
    expect(summary.years.map((year) => year.basisReductionCents)).toEqual([415_000, 920_000, 920_000]);
    expect(summary.carriedIn).toBeNull();
    expect(summary.checks.map((check) => check.agrees)).toEqual([true, true, true]);
    expect(summary.cautions.at(-1)).toBe('Carryforward shown is unused, not guaranteed.');
  });

  it('lists a year before anything is typed of it, and takes no basis off for a credit that is not known', () => {
    expect(creditSummary(creditOf({ years: [] })).years).toMatchObject([
      { taxYear: 2024, status: 'notListed', limitTypedBy: null, limitFrom: null, documentId: null, filedOn: null },
    ]);
    const unknown = creditSummary(creditOf({ years: [creditYear(2024, null, { status: 'amended' })] }));
    expect(unknown.years).toMatchObject([{ status: 'amended', basisReductionCents: 0, limitFrom: null }]);
  });

  it('leaves a check open while a limit is missing', () => {
    const summary = creditSummary(creditOf({ years: [creditYear(2024, null, {}), creditYear(2025, 1, {})] }));
    expect(summary.checks.map((check) => check.agrees)).toEqual([null, null]);
    expect(summary.years[0]?.limitTypedBy).toBeNull();
  });

  it('finds a carryforward that does not follow, and a credit that does not add up', () => {
    const [first, second, third] = creditLinesOf(creditOf());
    if (!first || !second || !third) throw new Error('three years');
    const broken = creditChecks([first, { ...second, line12Cents: cents(100) }, { ...third, line16Cents: cents(5) }]);
    expect(broken.map((check) => check.agrees)).toEqual([false, true, false]);
  });
});
