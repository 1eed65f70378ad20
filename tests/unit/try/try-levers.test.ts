import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loanBook } from '#shared/books/loan-book.ts';
import { type Levers, leversSchema } from '#shared/facts/scenario.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { projectFrom } from '#shared/position/project.ts';
import { hourlyExportOf, shareInHours } from '#shared/try/hourly-export.ts';
import { differenceSentence } from '#shared/try/sentence.ts';
import { type TryBasis, tryLevers } from '#shared/try/try-levers.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, addMonths, type Day, day, latestDay } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { sampleFacts } from '#tests/support/sample-facts.ts';

const facts = await sampleFacts();
const ledger = computeLedger(facts, { today: day('2026-12-01') });
const { basis } = ledger;
if (basis === null) throw new Error('the sample can be projected');
const start: TryBasis = { basis, hourly: hourlyExportOf(facts.intervals) };
const NONE = leversSchema.parse({});
const pull = (levers: Partial<Levers>) => tryLevers(start, { ...NONE, ...levers });
const outcome = (levers: Partial<Levers>) => {
  const tried = pull(levers);
  if (!tried.ok) throw new Error(tried.why);
  return tried.outcome;
};
const faults = (levers: Partial<Levers>) => {
  const tried = pull(levers);
  return tried.ok ? [] : tried.faults.map((fault) => fault.field);
};
const SPRING = day('2027-04-01');
const base = outcome({});
const NO_RUNS = 25;

describe('levers left alone', () => {
  it('give the base projection, month for month', () => {
    const projected = projectFrom(basis);
    if (!projected.ok) throw new Error(projected.why);
    expect(base.months).toEqual(projected.projection.months);
    expect(base.evenOn).toBe(projected.projection.evenOn);
  });

  it('and so do levers pulled to where things stand', () => {
    const { priceRise, degradation } = basis.facts.assumptions;
    const still: Partial<Levers>[] = [
      { priceRise },
      { degradation },
      { exportCut: { from: SPRING, keep: '1' } },
      { moreUse: { from: SPRING, whPerDay: wh(0), fromHour: 9, toHour: 16 } },
      { replacement: { on: SPRING, costCents: cents(0) } },
    ];
    for (const levers of still) expect(outcome(levers).months).toEqual(base.months);
  });

  it('say nothing', () => {
    expect(differenceSentence(NONE, base, base)).toBeNull();
  });
});

describe('a paydown', () => {
  const paid = (amount: number, reamortize: boolean) =>
    outcome({ paydown: { on: SPRING, amountCents: cents(amount), reamortize } });

  it('saves interest, and re-amortizing lowers the payment and saves less of it', () => {
    const shorter = paid(550_500, false);
    const lower = paid(550_500, true);
    expect(shorter.interestCents).toBeLessThan(lower.interestCents);
    expect(lower.interestCents).toBeLessThan(base.interestCents);
    expect(shorter.paymentCents).toBe(base.paymentCents);
    expect(lower.paymentCents ?? 0).toBeLessThan(base.paymentCents ?? 0);
    expect(shorter.paidOffOn && base.paidOffOn && shorter.paidOffOn < base.paidOffOn).toBe(true);
    // An earlier extra payment had shortened the term; re-amortizing spreads the rest over the contract's own months again.
    const { loan } = basis.facts;
    if (loan === null) throw new Error('the sample has a loan');
    expect(lower.paidOffOn).toBe(addMonths(loan.firstPaymentOn, loan.termMonths - 1));
  });

  it('what it saves in interest is what it adds at the end, once the loan is paid off', () => {
    const changed = paid(550_500, true);
    expect(changed.settledCents - base.settledCents).toBe(base.interestCents - changed.interestCents);
  });

  it('never adds interest while the payment stays, however much is paid and whenever; re-amortized it saves less', () => {
    fc.assert(
      fc.property(fc.integer({ min: 100, max: 2_000_000 }), fc.integer({ min: 0, max: 100 }), (amount, months) => {
        const on = addMonths(day('2027-01-10'), months);
        const paid = (reamortize: boolean) => outcome({ paydown: { on, amountCents: cents(amount), reamortize } });
        const shorter = paid(false).interestCents;
        expect(shorter).toBeLessThanOrEqual(base.interestCents);
        expect(paid(true).interestCents).toBeGreaterThanOrEqual(shorter);
      }),
      { numRuns: NO_RUNS },
    );
  }, 60_000);

  it('is told in one sentence', () => {
    const levers = { ...NONE, paydown: { on: SPRING, amountCents: cents(550_500), reamortize: true } };
    const said = differenceSentence(levers, base, outcome(levers));
    expect(said).toMatch(
      /^Paying \$5,505 into the loan on 1 Apr 2027 and re-amortizing: .*even in \w+ 20\d\d.*, \$[\d,]+ less interest, a payment of \$[\d.]+ instead of \$[\d.]+, \$[\d,]+ more at the end\.$/,
    );
  });
});

describe('other levers', () => {
  it('cash: no loan is left to pay, and the cash price stands in its place', () => {
    const changed = outcome({ cash: true });
    expect(changed.paymentCents).toBeNull();
    expect(changed.interestCents).toBe(0);
    const loan = basis.facts.loan;
    if (loan === null) throw new Error('the sample has a loan');
    const paidAfterwards = loanBook(loan).steps.reduce((sum, step) => sum + step.cashCents, 0);
    expect(changed.settledCents - base.settledCents).toBe(
      -paidAfterwards - (loan.principalCents - loan.dealerFeeCents),
    );
  });

  it('a refinance at a lower rate over the months left saves interest; its costs are paid', () => {
    const at = (annualRate: string, costsCents: number) =>
      outcome({ refinance: { on: SPRING, annualRate, termMonths: 120, costsCents: cents(costsCents) } });
    expect(at('0.02', 0).interestCents).toBeLessThan(at('0.06', 0).interestCents);
    expect(at('0.02', 0).settledCents - at('0.02', 120_000).settledCents).toBe(120_000);
  });

  it('the less export keeps, the later even and the less at the end', () => {
    const kept = ['0', '0.25', '0.5', '0.75', '1'].map((keep) => outcome({ exportCut: { from: SPRING, keep } }));
    for (const [at, changed] of kept.entries()) {
      const before = kept[at - 1];
      if (!before) continue;
      expect(changed.settledCents).toBeGreaterThanOrEqual(before.settledCents);
      if (before.evenOn !== null) expect(changed.evenOn !== null && changed.evenOn <= before.evenOn).toBe(true);
    }
    expect(kept[0]?.settledCents).toBeLessThan(base.settledCents);
  });

  it('export cut from a day leaves the months before it as they were', () => {
    const changed = outcome({ exportCut: { from: day('2031-04-01'), keep: '0.2' } }).months;
    const before = base.months.filter((month) => month.on <= '2031-04-01');
    expect(changed.slice(0, before.length)).toEqual(before);
    expect(changed[before.length]).not.toEqual(base.months[before.length]);
  });

  it('say what they take for granted, each its own', () => {
    const assumed = (levers: Partial<Levers>) => {
      const tried = pull(levers);
      return tried.ok ? tried.assumed.map((one) => one.split(/[ ’]/).slice(0, 3).join(' ')) : [];
    };
    const refinance = { on: SPRING, annualRate: '0.03', termMonths: 120, costsCents: cents(0) };
    expect(assumed({ refinance })).toEqual(['The new loan']);
    expect(assumed({ paydown: { on: SPRING, amountCents: cents(100), reamortize: false } })).toEqual([
      'The lender takes',
    ]);
    expect(assumed({ cash: true })).toEqual(['The loan s']);
    expect(assumed({ exportCut: { from: SPRING, keep: '0.5' } })).toEqual(['What export takes']);
    expect(assumed({ sale: { on: SPRING, roofValueCents: cents(0) } })).toEqual(['On the day']);
    expect(assumed({ priceRise: '0.03', degradation: '0.01' })).toEqual([]);
  });

  it('a month’s parts still add up when export is cut', () => {
    const { months } = outcome({ exportCut: { from: SPRING, keep: '0.37' } });
    for (const [at, month] of months.entries()) {
      const before = months[at - 1];
      const parts = Object.values(month.books).reduce((sum, one) => sum + one, 0);
      expect(month.addedCents).toBe(parts);
      if (before) expect(month.cashSoFarCents).toBe(before.cashSoFarCents + month.addedCents);
      expect(month.settledTodayCents).toBe(
        month.cashSoFarCents +
          month.loanPayoffCents +
          month.creditStillToComeCents +
          month.incentiveOwedCents +
          month.utilityBankCents,
      );
    }
  });

  it('a higher rise of prices brings more; faster ageing less', () => {
    expect(outcome({ priceRise: '0.05' }).settledCents).toBeGreaterThan(base.settledCents);
    expect(outcome({ degradation: '0.02' }).settledCents).toBeLessThan(base.settledCents);
  });

  it('more use by day is met by the roof further than the same use by night', () => {
    const use = (fromHour: number, toHour: number) =>
      outcome({ moreUse: { from: SPRING, whPerDay: wh(8000), fromHour, toHour } }).settledCents;
    expect(use(10, 15)).toBeGreaterThanOrEqual(use(22, 5));
  });

  it('a replacement costs what it costs; months before it stay as they were', () => {
    const on = day('2036-06-15');
    const changed = outcome({ replacement: { on, costCents: cents(240_000) } });
    expect(base.settledCents - changed.settledCents).toBe(240_000);
    const upTo = (months: typeof base.months) => months.filter((month) => month.on <= on);
    expect(upTo(changed.months)).toEqual(upTo(base.months));
  });

  it('a sale ends every stream on its day and brings what the buyer pays for the roof', () => {
    const on = day('2034-06-01');
    const changed = outcome({ sale: { on, roofValueCents: cents(500_000) } });
    const after = changed.months.filter((month) => month.on > on);
    expect(after.every((month) => month.loanBalanceCents === 0)).toBe(true);
    expect(new Set(after.slice(1).map((month) => month.books.billAvoided))).toEqual(new Set([0]));
    expect(changed.paidOffOn).toBe(on);
    const without = outcome({ sale: { on, roofValueCents: cents(0) } });
    expect(changed.settledCents - without.settledCents).toBe(500_000);
  });

  it('a refinance where nothing is owed any more changes nothing', () => {
    const { paidOffOn } = base;
    if (paidOffOn === null) throw new Error('the sample’s loan ends');
    const refinance = { on: addMonths(paidOffOn, 1), annualRate: '0.02', termMonths: 60, costsCents: cents(90_000) };
    expect(outcome({ refinance }).months).toEqual(base.months);
  });

  it('more use is met by the export that is left where export is cut, too', () => {
    const cut = { from: SPRING, keep: '0' };
    const moreUse = { from: SPRING, whPerDay: wh(8000), fromHour: 10, toHour: 15 };
    const loses = outcome({}).settledCents - outcome({ exportCut: cut }).settledCents;
    const losesLess = outcome({ moreUse }).settledCents - outcome({ exportCut: cut, moreUse }).settledCents;
    expect(losesLess).toBeLessThan(loses);
    expect(losesLess).toBeGreaterThan(0);
  });

  it('more use says by which hours it was met: the house’s own, or an assumed shape of the day', () => {
    const moreUse = { from: SPRING, whPerDay: wh(8000), fromHour: 10, toHour: 15 };
    const assumed = (of: TryBasis) => {
      const tried = tryLevers(of, { ...NONE, moreUse });
      return tried.ok ? tried.assumed.join(' ') : '';
    };
    expect(assumed(start)).toContain('by the hours in which the house sends out');
    expect(assumed({ ...start, hourly: hourlyExportOf([]) })).toContain('by an assumed shape of the day');
  });

  it('a plan can be tried from the close on where none is in force', () => {
    const now = basis.facts.plans.at(-1);
    if (!now) throw new Error('the sample has a plan');
    const none: TryBasis = {
      ...start,
      basis: { ...basis, today: basis.close.on, facts: { ...basis.facts, plans: [] } },
    };
    expect(tryLevers(none, { ...NONE, plan: { from: basis.close.on, plan: now.plan } }).ok).toBe(true);
  });

  it('another plan from a day on leaves the house without a roof on its own', () => {
    const now = basis.facts.plans.at(-1);
    if (!now) throw new Error('the sample has a plan');
    const same = outcome({ plan: { from: SPRING, plan: now.plan } });
    expect(same.months).toEqual(base.months);
  });
});

describe('levers that cannot be pulled so', () => {
  it('are refused by name, whatever else is pulled', () => {
    const past = day('2026-01-01');
    expect(faults({ paydown: { on: past, amountCents: cents(100), reamortize: false } })).toEqual(['paydown.on']);
    expect(faults({ sale: { on: day('2099-01-01'), roofValueCents: cents(0) } })).toEqual(['sale.on']);
    expect(faults({ priceRise: '0.5', degradation: '-0.1' })).toEqual(['priceRise', 'degradation']);
    expect(faults({ exportCut: { from: SPRING, keep: '1.2' } })).toEqual(['exportCut.keep']);
    expect(faults({ moreUse: { from: SPRING, whPerDay: wh(-1), fromHour: 1, toHour: 2 } })).toEqual([
      'moreUse.whPerDay',
    ]);
    const both = { cash: true, paydown: { on: SPRING, amountCents: cents(1), reamortize: false } };
    expect(faults(both)).toEqual(['paydown']);
    expect(
      faults({ cash: true, refinance: { on: SPRING, annualRate: '0.9', termMonths: 12, costsCents: cents(0) } }),
    ).toEqual(['refinance', 'refinance.annualRate']);
  });

  it('on a record that cannot be projected say why', () => {
    const none: TryBasis = { ...start, basis: { ...basis, facts: { ...basis.facts, plans: [] } } };
    const why = 'There is no rate plan for the months to come.';
    const faultless = { ok: false, why, faults: [] };
    expect(tryLevers(none, NONE)).toEqual(faultless);
    expect(tryLevers(none, { ...NONE, exportCut: { from: SPRING, keep: '0.5' } })).toEqual(faultless);
    expect(tryLevers(none, { ...NONE, exportCut: { from: SPRING, keep: '1' } })).toEqual(faultless);
  });

  it('say why where only what is sent out cannot be settled', () => {
    const dear = basis.facts.plans.map((one) => ({
      ...one,
      plan: {
        ...one.plan,
        credits: one.plan.credits.map((credit) => ({
          ...credit,
          rates: credit.rates?.map((row) => ({ ...row, rate: '99999999' })) ?? null,
        })),
      },
    }));
    const of: TryBasis = {
      ...start,
      basis: { ...basis, today: basis.close.on, facts: { ...basis.facts, plans: dear } },
    };
    const tried = tryLevers(of, { ...NONE, exportCut: { from: basis.close.on, keep: '0.5' } });
    expect(tried).toMatchObject({ ok: false, why: expect.stringContaining('more than any house could owe') });
  });

  it('are told by the first of their faults', () => {
    const past = day('2026-01-01');
    const tried = pull({ paydown: { on: past, amountCents: cents(100), reamortize: false }, priceRise: '0.5' });
    expect(tried).toMatchObject({ ok: false, why: expect.stringContaining('What was is in the record.') });
    const refinance = { on: SPRING, annualRate: '0.05', termMonths: 12, costsCents: cents(0) };
    const none: TryBasis = { ...start, basis: { ...basis, facts: { ...basis.facts, loan: null } } };
    expect(tryLevers(none, { ...NONE, refinance })).toMatchObject({ ok: false, why: 'There is no loan to refinance.' });
  });

  it('may be pulled on the day of the record’s end and on the last day before the horizon, and to either end of a scale', () => {
    const first = latestDay(basis.today, basis.close.on);
    const last = addDays(addMonths(basis.close.on, basis.facts.assumptions.horizonMonths), -1);
    const sale = (on: Day) => faults({ sale: { on, roofValueCents: cents(0) } });
    expect([sale(first), sale(last)]).toEqual([[], []]);
    expect([sale(addDays(first, -1)), sale(addDays(last, 1))]).toEqual([['sale.on'], ['sale.on']]);
    for (const priceRise of ['-0.2', '0.2']) expect(faults({ priceRise })).toEqual([]);
    for (const priceRise of ['-0.2001', '0.2001']) expect(faults({ priceRise })).toEqual(['priceRise']);
    for (const degradation of ['0', '0.1']) expect(faults({ degradation })).toEqual([]);
    expect(faults({ degradation: '0.1001' })).toEqual(['degradation']);
    expect(faults({ exportCut: { from: SPRING, keep: '-0.1' } })).toEqual(['exportCut.keep']);
    const refinance = (annualRate: string) =>
      faults({ refinance: { on: SPRING, annualRate, termMonths: 12, costsCents: cents(0) } });
    expect([refinance('0'), refinance('0.4'), refinance('0.4001')]).toEqual([[], [], ['refinance.annualRate']]);
  });

  it('a loan that is not there can be neither paid down, refinanced nor left out', () => {
    const none: TryBasis = { ...start, basis: { ...basis, facts: { ...basis.facts, loan: null } } };
    const tried = tryLevers(none, {
      ...NONE,
      cash: true,
      paydown: { on: SPRING, amountCents: cents(1), reamortize: false },
    });
    expect(tried.ok ? [] : tried.faults.map((fault) => fault.field)).toEqual(['paydown', 'cash', 'paydown']);
  });
});

describe('when in the day the house sends out', () => {
  it('is a share of the day between two hours, past midnight too', () => {
    const { hourly } = start;
    const whole = shareInHours(hourly, SPRING, 0, 24);
    expect(whole).toBe(1);
    expect(shareInHours(hourly, SPRING, 6, 18) + shareInHours(hourly, SPRING, 18, 6)).toBeCloseTo(1, 12);
  });

  it('is no share at all of a month in which nothing is sent out', () => {
    const dark = {
      months: Array.from({ length: 12 }, () => new Array<number>(24).fill(0)),
      from: 'intervals' as const,
    };
    expect(shareInHours(dark, SPRING, 6, 18)).toBe(0);
  });

  it('counts the first hour and not the last, and the whole day where both are one', () => {
    const months = Array.from({ length: 12 }, () => Array.from({ length: 24 }, (_, hour) => (hour === 9 ? 1 : 3)));
    const even = { months, from: 'intervals' as const };
    expect(shareInHours(even, SPRING, 9, 10)).toBe(1 / 70);
    expect(shareInHours(even, SPRING, 10, 9)).toBe(69 / 70);
    expect(shareInHours(even, SPRING, 8, 9)).toBe(3 / 70);
    expect(shareInHours(even, SPRING, 9, 9)).toBe(1);
  });

  it('is a stated half sine of one Wh a day where there are no readings by the hour', () => {
    const shape = hourlyExportOf([]);
    expect(shape.from).toBe('assumed');
    for (const hours of shape.months) expect(hours.reduce((sum, one) => sum + one, 0)).toBeCloseTo(1, 12);
  });

  it('takes whole days alone, and for a month with too few the mean of the others', () => {
    const daysOf = (month: string, count: number, value: number, minutes = 60) =>
      Array.from({ length: count }, (_, index) => ({
        channel: 'export' as const,
        day: day(`2026-${month}-${String(index + 1).padStart(2, '0')}`),
        minutes,
        values: new Array<number | null>((24 * 60) / minutes).fill(value),
        documentId: null,
      }));
    const broken = daysOf('06', 1, 9).map((one) => ({ ...one, values: [null, ...one.values.slice(1)] }));
    const profile = hourlyExportOf([
      ...daysOf('05', 25, 100),
      ...daysOf('06', 3, 900),
      ...broken,
      ...daysOf('07', 25, 30, 30),
    ]);
    expect(profile.from).toBe('intervals');
    expect(profile.months[4]?.[12]).toBe(100);
    expect(profile.months[6]?.[12]).toBe(60);
    expect(profile.months[5]?.[12]).toBe(80);
  });
});
