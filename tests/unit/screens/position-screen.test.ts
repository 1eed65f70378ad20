import { describe, expect, it } from 'vitest';
import { BOOKS } from '#shared/books/book.ts';
import type { ByBook, Figure, Position, PositionPoint, ProjectedMonth } from '#shared/position/position.ts';
import { cents, dollarsText, sumCents } from '#shared/units/cents.ts';
import { addMonths, day } from '#shared/units/day.ts';
import { evaluateWorking } from '#shared/working-formula.ts';
import { addsUp, booksShown } from '#src/features/position/adds-up.ts';
import { barScale, chartSeries } from '#src/features/position/chart-series.ts';
import { standing } from '#src/features/position/position-words.ts';
import { niceStep, yearTicks } from '#src/ui/chart/axes.ts';

const NONE: ByBook = {
  billAvoided: cents(0),
  incentive: cents(0),
  insurance: cents(0),
  credit: cents(0),
  loan: cents(0),
  upkeep: cents(0),
  costs: cents(0),
};

function figure(amount: number): Figure {
  return {
    amountCents: cents(amount),
    working: {
      words: 'stated',
      formula: 'a',
      inputs: [
        {
          name: 'a',
          label: 'a',
          value: dollarsText(cents(amount)),
          unit: 'USD',
          source: { kind: 'figure', name: 'a' },
        },
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function point(
  cycle: PositionPoint['cycle'],
  on: string,
  books: Partial<ByBook>,
  cash: number,
  settled: number,
): PositionPoint {
  const all = { ...NONE, ...books };
  return {
    cycle,
    on: day(on),
    books: all,
    addedCents: sumCents(BOOKS.map((book) => all[book])),
    cashSoFarCents: cents(cash),
    loanPayoffCents: cents(settled - cash),
    creditStillToComeCents: cents(0),
    incentiveOwedCents: cents(0),
    utilityBankCents: cents(0),
    settledTodayCents: cents(settled),
    provisional: false,
  };
}

/** Two cycles behind, one day since, and sixty months ahead that come even in the fortieth. */
function position(): Position {
  const points = [
    point('before', '2026-06-14', { costs: cents(-500_00) }, -500_00, -4000_00),
    point(day('2026-07-14'), '2026-07-14', { billAvoided: cents(150_00), loan: cents(-60_00) }, -410_00, -3900_00),
    point(day('2026-08-14'), '2026-08-14', { billAvoided: cents(160_00), loan: cents(-60_00) }, -310_00, -3800_00),
    point('since', '2026-09-02', { loan: cents(-60_00) }, -370_00, -3805_00),
  ];
  const months: ProjectedMonth[] = Array.from({ length: 60 }, (_, index) => {
    const books = { ...NONE, billAvoided: cents(155_00), loan: cents(-60_00) };
    const cash = -310_00 + (index + 1) * 95_00;
    return {
      on: addMonths(day('2026-09-01'), index),
      books,
      addedCents: cents(95_00),
      cashSoFarCents: cents(cash),
      loanPayoffCents: cents(-3800_00 + (index + 1) * 95_00 - cash),
      creditStillToComeCents: cents(0),
      incentiveOwedCents: cents(0),
      utilityBankCents: cents(0),
      settledTodayCents: cents(-3800_00 + (index + 1) * 95_00),
      loanBalanceCents: cents(Math.max(cash + 3800_00 - (index + 1) * 95_00, 0)),
    };
  });
  const even = months.find((month) => month.settledTodayCents >= 0)?.on ?? null;
  const sums = (ids: number[]) =>
    Object.fromEntries(
      BOOKS.map((book) => [book, figure(sumCents(ids.map((id) => points[id]?.books[book] ?? cents(0))))]),
    );
  return {
    today: day('2026-09-02'),
    points,
    cashSoFar: figure(-370_00),
    settledToday: figure(-3805_00),
    settledWithoutCredit: figure(-3805_00),
    settledParts: {
      loanPayoff: figure(-3435_00),
      creditStillToCome: figure(0),
      incentiveOwed: figure(0),
      utilityBank: figure(0),
    },
    pace: figure(100_00),
    margin: null,
    marginMean: null,
    sums: { lastCycle: sums([2]), last12: sums([1, 2]), all: sums([0, 1, 2, 3]) },
    events: [],
    projection: { months, evenOn: even, assumptions: [] },
    whyNoProjection: null,
  };
}

describe('how it adds up', () => {
  it('has columns that add to their own totals as printed, down to settled today', () => {
    const columns = addsUp(position());
    expect(columns.map((column) => column.key)).toEqual(['lastCycle', 'last12', 'all', 'even']);
    for (const column of columns) {
      const books = sumCents(booksShown(columns).map((book) => column.books[book]?.cents ?? cents(0)));
      expect(books).toBe(column.cash?.cents);
      if (column.settled === null) continue;
      const between = [column.loan, column.creditToCome, column.incentiveOwed, column.bank];
      const total = sumCents([column.cash?.cents ?? cents(0), ...between.map((cell) => cell?.cents ?? cents(0))]);
      expect(total).toBe(column.settled.cents);
    }
  });

  it('gives the totals it makes itself a working that comes to exactly the figure', () => {
    for (const column of addsUp(position())) {
      const { cash } = column;
      if (!cash?.working) continue;
      expect(evaluateWorking(cash.working).toFixed(2)).toBe(dollarsText(cash.cents));
    }
  });

  it('opens the working of every projected figure, and each comes to exactly it', () => {
    const even = addsUp(position()).find((column) => column.key === 'even');
    const cells = even
      ? [
          ...Object.values(even.books),
          even.cash,
          even.loan,
          even.creditToCome,
          even.incentiveOwed,
          even.bank,
          even.settled,
        ]
      : [];
    expect(cells.length).toBeGreaterThan(8);
    for (const cell of cells) {
      expect(cell?.working?.basis).toBe('estimated');
      if (cell?.working) expect(evaluateWorking(cell.working).toFixed(2)).toBe(dollarsText(cell.cents));
    }
  });

  it('leaves out books that have nothing in any column', () => {
    expect(booksShown(addsUp(position()))).toEqual(['billAvoided', 'loan', 'costs']);
  });
});

describe('the running chart', () => {
  it('ends the record today and starts the projection with the last closed cycle', () => {
    const series = chartSeries(position(), false);
    expect(series?.past.at(-1)?.on).toBe('2026-09-02');
    expect(series?.projected[0]?.on).toBe('2026-08-14');
    expect(series?.bars.filter((bar) => !bar.projected)).toHaveLength(2);
    expect(series?.since?.addedCents).toBe(-60_00);
  });

  it('shows every figure of the projection when asked for the whole', () => {
    const whole = chartSeries(position(), true);
    expect(whole?.projected).toHaveLength(61);
    expect(whole?.cut).toBe(false);
  });

  it('does not let one large payment press all other bars flat', () => {
    const series = chartSeries(position(), true);
    const bars = series?.bars ?? [];
    const [first] = bars;
    if (!first) throw new Error('no bar');
    const large = { ...first, books: { ...NONE, loan: cents(-5000_00) } };
    expect(barScale([...bars, large]).downCents).toBeLessThan(200_00);
    expect(barScale(bars).downCents).toBe(60_00);
  });

  it('names only years whose middle is on the chart', () => {
    expect(yearTicks(day('2024-08-01'), day('2027-06-01'), 20, 0).map((tick) => tick.year)).toEqual([2025, 2026]);
  });

  it('steps its amounts by round figures', () => {
    expect(niceStep(35_000, 4)).toBe(10_000);
    expect(niceStep(700, 4)).toBe(200);
    expect(niceStep(0, 4)).toBe(1);
  });
});

describe('the sentence', () => {
  const words = (change: Partial<Position>) =>
    standing({ ...position(), ...change })
      .map((part) => part.text)
      .join('');

  it('says how far from even and how fast that closes', () => {
    expect(words({})).toBe('$3,805 from even, closing $100 a month.');
  });

  it('says when it falls back, and when it is past even', () => {
    expect(words({ pace: figure(-40_00) })).toBe('$3,805 from even, falling back $40 a month.');
    expect(words({ settledToday: figure(1204_00) })).toBe('$1,204 past even, gaining $100 a month.');
  });

  it('says no pace before there is one', () => {
    expect(words({ pace: null })).toBe('$3,805 from even.');
  });
});
