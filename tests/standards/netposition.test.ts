import { describe, expect, it } from 'vitest';
import { amortize } from '#shared/books/amortize.ts';
import { billAvoidedEntry } from '#shared/books/bill-avoided.ts';
import type { UnplacedEntry } from '#shared/books/book.ts';
import { costEntries } from '#shared/books/costs.ts';
import { incentiveEarned } from '#shared/books/incentive.ts';
import type { IncentiveFacts } from '#shared/facts/finance.ts';
import { escalateRate } from '#shared/position/escalate.ts';
import { firstCrossing, lastingCrossing } from '#shared/position/even.ts';
import { foldPosition } from '#shared/position/fold.ts';
import { placeEntries } from '#shared/position/place.ts';
import type { PositionPoint } from '#shared/position/position.ts';
import { type Cents, cents, dollarsText, negateCents, parseDollars, sumCents } from '#shared/units/cents.ts';
import { addDays, addMonths, type Day, day } from '#shared/units/day.ts';
import { Exact, exact, roundToCents, roundToWh } from '#shared/units/rate.ts';
import { readVectors } from './vectors.ts';

/**
 * `netposition_vectors.json`: monthly net positions on invented figures, on which two independent implementations (decimal and exact rational) agree. Its
 * rules: a fixed charge that does not escalate; the energy rate is base × (1 + e)^year to five decimals; degradation by whole years; incentive and
 * each bill rounded half-up; insurance months inclusive; `payoff` measures cash so far less the loan balance. The driver below only
 * lays the inputs out month by month; loan, incentive, price rise, entries, placing, fold and crossings are the product's.
 */
type Input = {
  horizon: number;
  upfront?: string;
  loan?: { principal: string; rate: string; term: number; recast?: { month: number; prepay: string } };
  receipts?: Record<string, string>;
  pmi?: { amount: string; start: number; end: number };
  costs?: Record<string, string>;
  use: string;
  fixed: string;
  prod1: string;
  deg: string;
  rate1: string;
  esc: string;
  inc_rate?: string;
  inc_months?: number;
};
type Checkpoint = Record<
  'baseline' | 'actual' | 'incentive' | 'pmi' | 'loan' | 'prepay' | 'receipts' | 'costs' | 'net' | 'cum' | 'balance',
  string
> & { m: number };
type NetPositionVector = {
  id: string;
  title: string;
  input: Input;
  expected: {
    break_even_first: number | null;
    break_even_durable: number | null;
    payoff_break_even: number | null;
    totals: Record<'avoided' | 'incentive' | 'pmi' | 'loan' | 'prepay' | 'receipts' | 'costs', string>;
    final_cumulative: string;
    min_cumulative: string;
    min_month: number;
    checkpoints: Checkpoint[];
    net: string[];
  };
};

/** Month m of a vector runs from the first of a month to the first of the next; the year is of no consequence. */
const START = day('2024-01-01');
const monthStart = (m: number) => addMonths(START, m - 1);
const monthEnd = (m: number) => addMonths(START, m);

const vectors = readVectors<NetPositionVector>('netposition_vectors.json');

describe('Net positions agree with the independent vectors', () => {
  it('has vectors to check', () => {
    expect(vectors.length).toBeGreaterThan(0);
  });

  it.each(vectors.map((vector) => [`${vector.id} ${vector.title}`, vector] as const))(
    '%s',
    (_name, { input, expected }) => {
      const run = runVector(input);
      expect(run.months.map((month) => month.net)).toEqual(expected.net.map(usd));
      for (const checkpoint of expected.checkpoints) {
        const { m, ...stated } = checkpoint;
        const month = run.months[m - 1];
        expect({ m, ...month }).toEqual({ m, ...mapUsd(stated) });
      }
      const cumulative = run.months.map((month) => month.cum);
      const lowest = Math.min(...cumulative);
      expect({
        first: monthOf(firstCrossing(cumulative)),
        durable: monthOf(lastingCrossing(cumulative)),
        payoff: monthOf(lastingCrossing(run.months.map((month) => month.cum - month.balance))),
        final: cumulative.at(-1),
        lowest,
        lowestMonth: cumulative.indexOf(cents(lowest)) + 1,
      }).toEqual({
        first: expected.break_even_first,
        durable: expected.break_even_durable,
        payoff: expected.payoff_break_even,
        final: usd(expected.final_cumulative),
        lowest: usd(expected.min_cumulative),
        lowestMonth: expected.min_month,
      });
      const total = (key: Exclude<keyof Checkpoint, 'm'>) => sumCents(run.months.map((month) => month[key]));
      expect({
        avoided: cents(total('baseline') - total('actual')),
        incentive: total('incentive'),
        pmi: total('pmi'),
        loan: total('loan'),
        prepay: total('prepay'),
        receipts: total('receipts'),
        costs: total('costs'),
      }).toEqual(mapUsd(expected.totals));
    },
  );
});

type Month = Record<Exclude<keyof Checkpoint, 'm'>, Cents>;

function runVector(input: Input): { months: Month[] } {
  const entries: UnplacedEntry[] = [];
  const bills = new Map<number, { baseline: Cents; actual: Cents }>();
  const loan = input.loan ? loanOf(input.loan) : null;
  const incentive = input.inc_rate ? incentiveOf(input.inc_rate, input.inc_months ?? 0) : null;
  if (input.upfront) {
    entries.push(
      ...costEntries([costOf('upfront', addDays(START, -1), 'signing', usd(input.upfront))], monthEnd(input.horizon)),
    );
  }
  for (let m = 1; m <= input.horizon; m += 1) {
    const years = Math.floor((m - 1) / 12);
    const production = productionOf(input, years);
    const rate = escalateRate(input.rate1, input.esc, years, 5);
    const baseline = bill(exact(input.use), rate, input.fixed);
    const actual = bill(exact(input.use).minus(production), rate, input.fixed);
    bills.set(m, { baseline, actual });
    entries.push(
      billAvoidedEntry({
        from: monthStart(m),
        to: monthEnd(m),
        withoutRoofCents: baseline,
        asItWasCents: actual,
        method: 'measured',
        estimated: false,
      }),
    );
    const [earned] = incentive
      ? incentiveEarned(incentive, [{ from: monthStart(m), to: monthEnd(m), productionWh: roundToWh(production) }])
      : [];
    if (earned) entries.push(plain(m, 'incentive', 'received', earned.amountCents));
    if (input.pmi && m >= input.pmi.start && m <= input.pmi.end)
      entries.push(plain(m, 'insurance', 'premium', usd(input.pmi.amount)));
    const receipt = input.receipts?.[String(m)];
    if (receipt) entries.push(plain(m, 'credit', 'refund', usd(receipt)));
    const cost = input.costs?.[String(m)];
    if (cost) entries.push(...costEntries([costOf(`cost-${m}`, monthStart(m), 'appraisal', usd(cost))], monthEnd(m)));
    const row = loan?.[m - 1];
    if (row) entries.push(plain(m, 'loan', 'payment', negateCents(row.paymentCents)));
    if (row && row.extraPrincipalCents > 0) {
      entries.push(plain(m, 'loan', 'extraPrincipal', negateCents(row.extraPrincipalCents)));
    }
  }
  const cycles = Array.from({ length: input.horizon }, (_, index) => ({
    from: monthStart(index + 1),
    to: monthEnd(index + 1),
    provisional: false,
    utilityBank: {
      amountCents: cents(0),
      working: { words: '', formula: '0', inputs: [], unit: 'USD', basis: 'computed' as const },
    },
  }));
  const placed = placeEntries(entries, cycles);
  const points = foldPosition({ entries: placed, cycles, today: monthEnd(input.horizon), loans: [], credit: null });
  const closes = points.filter((point) => point.cycle !== 'before' && point.cycle !== 'since');
  return {
    months: closes.map((point, index) => monthFrom(point, index + 1, bills, loan)),
  };

  function monthFrom(
    point: PositionPoint,
    m: number,
    paid: typeof bills,
    rows: ReturnType<typeof loanOf> | null,
  ): Month {
    const own = placed.filter((entry) => entry.cycle === point.cycle);
    const of = (book: UnplacedEntry['book'], kind?: string) =>
      sumCents(
        own.filter((entry) => entry.book === book && (!kind || entry.kind === kind)).map((entry) => entry.amountCents),
      );
    return {
      baseline: paid.get(m)?.baseline ?? cents(0),
      actual: paid.get(m)?.actual ?? cents(0),
      incentive: of('incentive'),
      pmi: of('insurance'),
      loan: negateCents(of('loan', 'payment')),
      prepay: negateCents(of('loan', 'extraPrincipal')),
      receipts: of('credit'),
      costs: negateCents(of('costs')),
      net: point.addedCents,
      cum: point.cashSoFarCents,
      balance: rows?.[m - 1]?.balanceCents ?? cents(0),
    };
  }
}

function loanOf(loan: NonNullable<Input['loan']>) {
  return amortize({
    principalCents: usd(loan.principal),
    annualRate: loan.rate,
    months: loan.term,
    events: loan.recast
      ? [{ afterPayment: loan.recast.month, principalCents: usd(loan.recast.prepay), reamortize: true }]
      : [],
  }).rows;
}

function productionOf(input: Input, years: number): Exact {
  return exact(input.prod1).times(new Exact(1).minus(exact(input.deg)).pow(years));
}

function bill(kwh: Exact, rate: string, fixed: string): Cents {
  return cents(roundToCents(kwh.times(exact(rate))) + usd(fixed));
}

/** A term of whole months; both its first and its last day count. */
function incentiveOf(rate: string, months: number): IncentiveFacts {
  const lastDay = addDays(addMonths(START, months), -1);
  return { payer: '', ratePerKwh: rate, firstDay: START, lastDay, paidAs: 'separate', received: [] };
}

function plain(m: number, book: UnplacedEntry['book'], kind: string, amountCents: Cents): UnplacedEntry {
  return {
    id: `${book}-${kind}-${m}`,
    date: monthStart(m),
    book,
    kind,
    label: '',
    amountCents,
    basis: book === 'insurance' ? 'avoided' : 'cash',
    estimated: false,
    working: {
      words: '',
      formula: dollarsText(cents(Math.abs(amountCents))),
      inputs: [],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

function costOf(id: string, on: Day, kind: 'signing' | 'appraisal', amountCents: Cents) {
  return { id, on, kind, label: id, amountCents, documentId: null, every: null, until: null };
}

function monthOf(index: number | null): number | null {
  return index === null ? null : index + 1;
}

function mapUsd<K extends string>(amounts: Record<K, string>): Record<K, Cents> {
  return Object.fromEntries(Object.entries<string>(amounts).map(([key, text]) => [key, usd(text)])) as Record<K, Cents>;
}

function usd(text: string): Cents {
  const amount = parseDollars(text);
  if (amount === null) throw new Error(`not an amount: ${text}`);
  return amount;
}
