import type { Entry } from '../books/book.ts';
import { owedFigure } from '../books/incentive.ts';
import { stated, usdInput } from '../books/inputs.ts';
import { payoffOfLoans } from '../books/other-money.ts';
import { creditEarnedBy, stillToComeFigure } from '../books/tax-credit.ts';
import { sayCount, sayMoney } from '../ledger/say.ts';
import { negateCents, subtractCents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import { counts } from './books-sum.ts';
import type { FoldInput } from './fold.ts';
import type { Figure, Position, PositionPoint, SettledParts } from './position.ts';
import { addFigures, BOOK_LABELS, meanFigure, type NamedFigure, roundedMean, sumOfEntries } from './sums.ts';

/** Cycles the pace and the mean margin look back over. */
const LOOK_BACK = 12;

type Totals = Pick<Position, 'settledToday' | 'settledWithoutCredit' | 'settledParts'>;

/** What stands between cash so far and settled today, at the last point. */
export function settledFigures(input: FoldInput, last: PositionPoint, cashSoFar: Figure): Totals {
  const parts = settledPartsOf(input, last);
  const named: NamedFigure[] = [
    { name: 'cashSoFar', label: 'Cash so far', figure: cashSoFar },
    { name: 'loanPayoff', label: 'Loan payoff', figure: parts.loanPayoff },
    { name: 'incentiveOwed', label: 'Incentive owed', figure: parts.incentiveOwed },
    { name: 'utilityBank', label: 'Utility bank', figure: parts.utilityBank },
  ];
  const credit = { name: 'creditStillToCome', label: 'Tax credit still to come', figure: parts.creditStillToCome };
  return {
    settledToday: addFigures('Cash so far, the loan paid off and everything owed collected', [...named, credit]),
    settledWithoutCredit: addFigures('Settled today without the tax credit still to come', named),
    settledParts: parts,
  };
}

function settledPartsOf(input: FoldInput, last: PositionPoint): SettledParts {
  const { loans, credit, entries } = input;
  const payoff = payoffOfLoans(loans, last.on);
  const amounts = (kept: (entry: Entry) => boolean) => entries.filter(kept).map((entry) => entry.amountCents);
  const incentive = entries.filter((entry) => entry.book === 'incentive');
  return {
    loanPayoff: payoff ? negative(payoff) : nothing('There is no loan'),
    creditStillToCome: credit
      ? stillToComeFigure(
          credit,
          creditEarnedBy(credit, last.on),
          amounts((entry) => entry.book === 'credit' && counts(entry)),
        )
      : nothing('There is no tax credit'),
    incentiveOwed:
      incentive.length === 0
        ? nothing('Nothing is earned or received')
        : owedFigure(
            incentive.filter((entry) => entry.kind === 'earned').map((entry) => entry.amountCents),
            incentive.filter(counts).map((entry) => entry.amountCents),
          ),
    utilityBank: input.cycles.at(-1)?.utilityBank ?? nothing('There is no cycle yet'),
  };
}

function negative(figure: Figure): Figure {
  const { working } = figure;
  return { amountCents: negateCents(figure.amountCents), working: { ...working, formula: `-(${working.formula})` } };
}

function nothing(words: string): Figure {
  return {
    amountCents: ZERO_CENTS,
    working: { words, formula: '0', inputs: [], unit: 'USD', basis: 'computed' },
  };
}

/** Mean change of settled today per cycle, between the closes of the last thirteen cycles (as many as there are); null before two. */
export function paceFigure(points: readonly PositionPoint[]): Figure | null {
  const closes = closesOf(points);
  const now = closes.at(-1);
  const span = Math.min(LOOK_BACK, closes.length - 1);
  const then = closes[closes.length - 1 - span];
  if (now === undefined || then === undefined || span < 1) return null;
  const change = subtractCents(now.settledTodayCents, then.settledTodayCents);
  const settled = stated('Settled today, by cycle');
  return {
    amountCents: roundedMean(change, span),
    working: {
      words: `${sayMoney(change)} in ${sayCount(span, 'cycle', 'cycles')}`,
      formula: 'roundCents((now - then) / cycles)',
      inputs: [
        usdInput('now', `Settled on ${now.on}`, now.settledTodayCents, settled),
        usdInput('then', `Settled on ${then.on}`, then.settledTodayCents, settled),
        { name: 'cycles', label: 'Cycles between', value: String(span), unit: 'cycles', source: stated('Cycles') },
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}

/**
 * The margin of the last cycle, bill avoided + incentive received + insurance avoided − scheduled loan payments − upkeep, and its mean over the
 * last twelve. Extra principal and credit receipts stand apart. Null without a cycle.
 */
export function marginFigures(
  entries: readonly Entry[],
  points: readonly PositionPoint[],
): { margin: Figure | null; marginMean: Figure | null } {
  const last = points.filter(isClose).at(-1);
  if (last === undefined) return { margin: null, marginMean: null };
  const closes = closesOf(points).slice(-LOOK_BACK);
  const counted = entries.filter(inMargin);
  const entriesOf = (point: PositionPoint) => counted.filter((entry) => entry.cycle === point.cycle);
  const lastEntries = entriesOf(last);
  const part = (book: 'billAvoided' | 'incentive' | 'insurance' | 'loan' | 'upkeep'): NamedFigure => {
    const label = book === 'loan' ? 'Scheduled loan payments' : BOOK_LABELS[book];
    return {
      name: book,
      label,
      figure: sumOfEntries(
        label,
        lastEntries.filter((entry) => entry.book === book),
      ),
    };
  };
  const margin = addFigures(
    'What the cycle left over after the scheduled loan payment and upkeep',
    (['billAvoided', 'incentive', 'insurance', 'loan', 'upkeep'] as const).map(part),
  );
  const margins = closes.map((point) => sumCents(entriesOf(point).map((entry) => entry.amountCents)));
  return { margin, marginMean: meanFigure('Margin by cycle', margins) };
}

function inMargin(entry: Entry): boolean {
  if (!counts(entry) || entry.book === 'credit' || entry.book === 'costs') return false;
  return entry.book !== 'loan' || entry.kind === 'payment';
}

function isClose(point: PositionPoint): boolean {
  return point.cycle !== 'before' && point.cycle !== 'since';
}

function closesOf(points: readonly PositionPoint[]): PositionPoint[] {
  return points.filter(isClose);
}
