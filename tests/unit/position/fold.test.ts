import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { billAvoidedEntry } from '#shared/books/bill-avoided.ts';
import { BOOKS, type Entry, type UnplacedEntry } from '#shared/books/book.ts';
import { costEntries } from '#shared/books/costs.ts';
import { incentiveEarned, incentiveReceived } from '#shared/books/incentive.ts';
import { loanEntries, loanPayoff } from '#shared/books/loan.ts';
import { insuranceEntries } from '#shared/books/mortgage-insurance.ts';
import { creditEntries, creditStillToCome } from '#shared/books/tax-credit.ts';
import { marginFigures, paceFigure, settledFigures } from '#shared/position/figures.ts';
import { foldPosition } from '#shared/position/fold.ts';
import { placeEntries } from '#shared/position/place.ts';
import type { Figure } from '#shared/position/position.ts';
import { sumsByBook } from '#shared/position/sums.ts';
import { cents, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, type Day, day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { usdOf } from '#shared/units/rate.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { creditOf, incentiveOf, loanOf, mortgageOf, paymentOf } from '../books/facts.ts';

const bank = (amount: number): Figure => ({
  amountCents: cents(amount),
  working: { words: '', formula: String(amount / 100), inputs: [], unit: 'USD', basis: 'computed' },
});

const monthly = (first: string, count: number) =>
  Array.from({ length: count }, (_, index) => ({
    from: addMonths(day(first), index),
    to: addMonths(day(first), index + 1),
    provisional: false,
    utilityBank: bank(1_000 + index),
  }));

const plain = (date: string, book: UnplacedEntry['book'], amount: number, kind = 'x'): UnplacedEntry => ({
  id: `${book}-${kind}-${date}`,
  date: day(date),
  book,
  kind,
  label: book,
  amountCents: cents(amount),
  basis: kind === 'earned' ? 'memo' : 'cash',
  estimated: false,
  working: { words: '', formula: '0', inputs: [], unit: 'USD', basis: 'computed' },
});

describe('placing an entry', () => {
  const cycles = monthly('2024-08-14', 2);
  const placed = (date: string, book: UnplacedEntry['book'], kind?: string) =>
    placeEntries([plain(date, book, 100, kind)], cycles)[0]?.cycle;

  it('is by its own date in the cycle that holds it, its first day in and its last day out', () => {
    expect(placed('2024-08-13', 'loan')).toBe('before');
    expect(placed('2024-08-14', 'loan')).toBe('2024-09-14');
    expect(placed('2024-09-13', 'loan')).toBe('2024-09-14');
    expect(placed('2024-09-14', 'loan')).toBe('2024-10-14');
    expect(placed('2024-10-14', 'loan')).toBe('since');
  });

  it('is in the cycle that ends on its date for the bill avoided and the incentive earned or credited', () => {
    expect(placed('2024-09-14', 'billAvoided')).toBe('2024-09-14');
    expect(placed('2024-10-14', 'billAvoided')).toBe('2024-10-14');
    expect(placed('2024-09-14', 'incentive', 'earned')).toBe('2024-09-14');
    expect(placed('2024-09-14', 'incentive', 'billCredit')).toBe('2024-09-14');
    expect(placed('2024-09-14', 'incentive', 'received')).toBe('2024-10-14');
  });

  it('comes out by its day, those of one day by their ids, and of one id as they came', () => {
    const one = (id: string, date: string, label: string) => ({ ...plain(date, 'costs', 1), id, label });
    const entries = [
      one('b', '2024-09-01', 'first b'),
      one('a', '2024-09-02', 'a day later'),
      one('a', '2024-09-01', 'a'),
      one('b', '2024-09-01', 'second b'),
      one('c', '2024-09-01', 'c'),
    ];
    const labels = placeEntries(entries, cycles).map((entry) => entry.label);
    expect(labels).toEqual(['a', 'first b', 'second b', 'c', 'a day later']);
  });

  it('is before the first cycle while there is none', () => {
    expect(placeEntries([plain('2024-09-14', 'loan', 1)], [])[0]?.cycle).toBe('before');
  });
});

describe('the position by cycle', () => {
  it('adds cash and avoided money and never a memo', () => {
    const cycles = monthly('2024-08-14', 1);
    const entries = placeEntries(
      [
        plain('2024-07-01', 'costs', -690_000),
        plain('2024-09-14', 'billAvoided', 16_000),
        plain('2024-09-14', 'incentive', 4_000, 'earned'),
        plain('2024-09-20', 'incentive', 2_500, 'received'),
      ],
      cycles,
    );
    const points = foldPosition({ entries, cycles, today: day('2024-10-01'), loans: [], credit: null });
    expect(
      points.map((point) => [point.cycle, point.addedCents, point.cashSoFarCents, point.incentiveOwedCents]),
    ).toEqual([
      ['before', -690_000, -690_000, 0],
      ['2024-09-14', 16_000, -674_000, 4_000],
      ['since', 2_500, -671_500, 1_500],
    ]);
  });

  it('counts a payment due on a close in the next cycle, for cash and for the loan alike', () => {
    const loan = loanOf({ firstPaymentOn: day('2024-09-14'), fundedOn: day('2024-08-14') });
    const cycles = monthly('2024-08-14', 1);
    const entries = placeEntries(loanEntries(loan, day('2024-09-14')), cycles);
    const [, close, since] = foldPosition({ entries, cycles, today: day('2024-09-14'), loans: [loan], credit: null });
    expect(close).toMatchObject({ cashSoFarCents: 0, loanPayoffCents: -3_017_475 });
    expect(since).toMatchObject({ cashSoFarCents: -23_241, loanPayoffCents: -2_994_234 });
    // Paying on the day moves nothing in what is settled.
    expect(cents((close?.settledTodayCents ?? 0) - (close?.utilityBankCents ?? 0))).toBe(
      cents((since?.settledTodayCents ?? 0) - (since?.utilityBankCents ?? 0)),
    );
  });

  it('has one point, up to today, while there is no cycle', () => {
    const entries = placeEntries([plain('2024-09-14', 'costs', -500)], []);
    const points = foldPosition({ entries, cycles: [], today: day('2024-10-01'), loans: [], credit: null });
    expect(points).toHaveLength(1);
    expect(points[0]).toMatchObject({ cycle: 'before', on: '2024-10-01', cashSoFarCents: -500 });
  });
});

describe('pace and margin', () => {
  const household = build({ cycles: 14, extra: 0, bill: 15_000 });

  it('take the mean change of settled today over the last twelve closes', () => {
    const closes = household.points.filter((point) => point.cycle !== 'before' && point.cycle !== 'since');
    const change = (closes[13]?.settledTodayCents ?? 0) - (closes[1]?.settledTodayCents ?? 0);
    expect(paceFigure(household.points)?.amountCents).toBe(Math.round(change / 12));
    expect(paceFigure(household.points.slice(0, 2))).toBeNull();
  });

  it('leave prepayments, credit receipts and costs out of a month’s margin', () => {
    const { margin, marginMean } = marginFigures(household.entries, household.points);
    const last = household.points.at(-2);
    const own = household.entries.filter((entry) => entry.cycle === last?.cycle && entry.basis !== 'memo');
    const expected = own.filter(
      (entry) => !['credit', 'costs'].includes(entry.book) && (entry.book !== 'loan' || entry.kind === 'payment'),
    );
    expect(margin?.amountCents).toBe(sumCents(expected.map((entry) => entry.amountCents)));
    expect(marginMean && evaluateWorking(marginMean.working).eq(usdOf(marginMean.amountCents))).toBe(true);
  });
});

/** A household of every book: monthly cycles from 14 August 2024, the loan's extra principal in the fifth month. */
function build(options: { cycles: number; extra: number; bill: number }) {
  const cycles = monthly('2024-08-14', options.cycles);
  const today: Day = addDays(cycles.at(-1)?.to ?? day('2024-08-14'), 20);
  const loan = loanOf({
    payments: options.extra > 0 ? [paymentOf('2024-11-15', 232.41 + options.extra, options.extra)] : [],
  });
  const credit = creditOf();
  const incentive = incentiveOf({
    firstDay: day('2024-08-14'),
    received: [
      {
        id: 'r',
        on: addMonths(day('2024-10-14'), 1),
        amountCents: cents(4_321),
        note: null,
        from: null,
        to: null,
        quantityWh: null,
        documentId: null,
      },
    ],
  });
  const seen = cycles.map((cycle, index) => ({
    from: cycle.from,
    to: cycle.to,
    productionWh: wh(500_000 + index * 1_234),
  }));
  const entries: Entry[] = placeEntries(
    [
      ...cycles.map((cycle, index) =>
        billAvoidedEntry({
          from: cycle.from,
          to: cycle.to,
          withoutRoofCents: cents(options.bill + index),
          asItWasCents: cents(index * 17),
          method: 'measured',
          estimated: false,
        }),
      ),
      ...incentiveEarned(incentive, seen),
      ...incentiveReceived(incentive, seen, today),
      ...loanEntries(loan, today),
      ...insuranceEntries(mortgageOf({}, { removedOn: day('2024-12-01') }), today),
      ...creditEntries(credit, today),
      ...costEntries(
        [
          {
            id: 'sign',
            on: day('2024-06-01'),
            kind: 'signing',
            label: 'Signing',
            amountCents: cents(690_000),
            documentId: null,
            every: null,
            until: null,
          },
        ],
        today,
      ),
    ],
    cycles,
  );
  const input = { entries, cycles, today, loans: [loan], credit };
  return { ...input, points: foldPosition(input) };
}

describe('for any household', () => {
  const any = fc.record({
    cycles: fc.integer({ min: 1, max: 40 }),
    extra: fc.integer({ min: 0, max: 9_000 }),
    bill: fc.integer({ min: -5_000, max: 60_000 }),
  });

  it('the position by entry, by cycle and by book is the same', () => {
    fc.assert(
      fc.property(any, (options) => {
        const { entries, points, cycles } = build(options);
        const byEntry = sumCents(entries.filter((entry) => entry.basis !== 'memo').map((entry) => entry.amountCents));
        const byCycle = sumCents(points.map((point) => point.addedCents));
        const byBook = sumCents(BOOKS.map((book) => sumCents(points.map((point) => point.books[book]))));
        const sums = sumsByBook(
          entries,
          cycles.map((cycle) => cycle.to),
        );
        expect([byCycle, byBook, points.at(-1)?.cashSoFarCents, sums.all.cashSoFar?.amountCents]).toEqual(
          Array(4).fill(byEntry),
        );
      }),
      { numRuns: 40 },
    );
  });

  it('the last point is the figures, whose workings evaluate to them', () => {
    fc.assert(
      fc.property(any, (options) => {
        const household = build(options);
        const {
          entries,
          points,
          cycles,
          loans: [loan],
          credit,
        } = household;
        const last = points.at(-1);
        const cashSoFar = sumsByBook(
          entries,
          cycles.map((cycle) => cycle.to),
        ).all.cashSoFar;
        if (!last || !cashSoFar) throw new Error('no point');
        const settled = settledFigures(household, last, cashSoFar);
        expect(settled.settledToday.amountCents).toBe(last.settledTodayCents);
        expect(settled.settledWithoutCredit.amountCents).toBe(last.settledTodayCents - last.creditStillToComeCents);
        expect(settled.settledParts.loanPayoff.amountCents).toBe(loan && -loanPayoff(loan, last.on).amountCents);
        expect(settled.settledParts.creditStillToCome.amountCents).toBe(creditStillToCome(credit, last.on).amountCents);
        const pace = paceFigure(points);
        const figures = [
          settled.settledToday,
          settled.settledWithoutCredit,
          ...Object.values(settled.settledParts),
          ...Object.values(marginFigures(entries, points)),
          ...(pace ? [pace] : []),
        ];
        for (const figure of figures) {
          expect(figure && evaluateWorking(figure.working).eq(usdOf(figure.amountCents))).toBe(true);
        }
      }),
      { numRuns: 20 },
    );
  });

  it('the sums of the last cycle, the last twelve and all evaluate to their entries', () => {
    const { entries, cycles } = build({ cycles: 26, extra: 4_000, bill: 18_000 });
    const sums = sumsByBook(
      entries,
      cycles.map((cycle) => cycle.to),
    );
    const groups = [sums.lastCycle, sums.last12, sums.all];
    expect(groups.map((group) => Object.keys(group))).toEqual(Array(3).fill([...BOOKS, 'cashSoFar']));
    for (const figure of groups.flatMap((group) => Object.values(group))) {
      expect(evaluateWorking(figure.working).eq(usdOf(figure.amountCents))).toBe(true);
    }
  });
});
