import type { IncentiveFacts } from '../facts/finance.ts';
import { sayKwh, sayMoney } from '../ledger/say.ts';
import type { Figure } from '../position/position.ts';
import { type Cents, cents, sumCents } from '../units/cents.ts';
import { addDays, type Day, daysBetween } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import { exact, kwhOf, roundToCents } from '../units/rate.ts';
import type { Source } from '../working.ts';
import type { UnplacedEntry } from './book.ts';
import { kwhInput, plainInput, stated, usdInput, usdListInput } from './inputs.ts';
import { type PaperName, sourceOfPaper } from './paper-source.ts';

/** A cycle as the incentive sees it. `billCreditCents` is what the statement credited for it, positive, where it is paid inside the bill. */
export type IncentiveCycle = {
  from: Day;
  to: Day;
  productionWh: Wh | null;
  estimated?: boolean;
  source?: Source | null;
  billCreditCents?: Cents | null;
};

const TERMS = stated('Incentive terms as entered');

/**
 * Earned by cycle, as memo on the cycle's `to`: rate × production × days of the cycle within the term / days of the cycle, rounded once. The
 * first and last day of the term both count. A cycle without production earns nothing that can be stated.
 */
export function incentiveEarned(incentive: IncentiveFacts, cycles: readonly IncentiveCycle[]): UnplacedEntry[] {
  const entries: UnplacedEntry[] = [];
  for (const cycle of cycles) {
    const days = daysBetween(cycle.from, cycle.to);
    const eligible = eligibleDays(incentive, cycle.from, cycle.to);
    if (cycle.productionWh === null || eligible === 0) continue;
    const estimated = cycle.estimated === true;
    const whole = eligible === days;
    entries.push({
      id: `incentive-earned-${cycle.to}`,
      date: cycle.to,
      book: 'incentive',
      kind: 'earned',
      label: whole ? 'Incentive earned' : `Incentive earned, ${eligible} of ${days} days in the term`,
      amountCents: incentiveFor(incentive, cycle.productionWh, eligible, days),
      basis: 'memo',
      estimated,
      working: {
        words: `${sayKwh(cycle.productionWh)} kWh × $${incentive.ratePerKwh}${whole ? '' : ` × ${eligible} of ${days} days`}, rounded to the cent`,
        formula: 'roundCents(rate * production * eligible / days)',
        inputs: [
          plainInput('rate', 'Rate', incentive.ratePerKwh, 'USD/kWh', TERMS),
          kwhInput('production', 'Production', cycle.productionWh, cycle.source ?? stated('Production of the cycle')),
          plainInput('eligible', 'Days in the term', String(eligible), 'days', TERMS),
          plainInput('days', 'Days', String(days), 'days', stated('Dates of the cycle')),
        ],
        unit: 'USD',
        basis: estimated ? 'estimated' : 'computed',
      },
    });
  }
  return entries;
}

/** What a production earns over a cycle of which `eligible` of `days` lie in the term. */
export function incentiveFor(incentive: IncentiveFacts, production: Wh, eligible: number, days: number): Cents {
  return roundToCents(exact(incentive.ratePerKwh).times(kwhOf(production)).times(eligible).div(days));
}

/** Days of `[from, to)` within the term, both its ends included. */
export function eligibleDays(incentive: IncentiveFacts, from: Day, to: Day): number {
  const start = from > incentive.firstDay ? from : incentive.firstDay;
  const afterLast = addDays(incentive.lastDay, 1);
  const end = to < afterLast ? to : afterLast;
  return Math.max(0, daysBetween(start, end));
}

/**
 * Received, in cash: the recorded receipts (kind `received`) where it is paid apart, and what each statement credited (kind `billCredit`, on
 * the cycle's `to`) where it is paid inside the bill. The bill as it was has that credit added back, so that it counts once.
 */
export function incentiveReceived(
  incentive: IncentiveFacts,
  cycles: readonly IncentiveCycle[],
  through: Day | null = null,
  papers: readonly PaperName[] = [],
): UnplacedEntry[] {
  if (incentive.paidAs === 'separate') {
    return incentive.received
      .filter((receipt) => through === null || receipt.on <= through)
      .map((receipt) =>
        receivedEntry(`incentive-${receipt.id}`, receipt.on, 'received', receipt.amountCents, {
          label: receipt.note ?? `Incentive from ${incentive.payer === '' ? 'the payer' : incentive.payer}`,
          words: 'Received, as entered; before income tax',
          source: sourceOfPaper(receipt.documentId, papers, stated('Incentive receipts as entered')),
        }),
      );
  }
  return cycles.flatMap((cycle) =>
    cycle.billCreditCents == null
      ? []
      : [
          receivedEntry(`incentive-bill-${cycle.to}`, cycle.to, 'billCredit', cycle.billCreditCents, {
            label: 'Incentive credited on the bill',
            words: 'Credited on the statement and added back to the bill; before income tax',
            source: stated('Incentive line of the statement'),
          }),
        ],
  );
}

function receivedEntry(
  id: string,
  date: Day,
  kind: 'received' | 'billCredit',
  amountCents: Cents,
  about: { label: string; words: string; source: Source },
): UnplacedEntry {
  return {
    id,
    date,
    book: 'incentive',
    kind,
    label: about.label,
    amountCents,
    basis: 'cash',
    estimated: false,
    working: {
      words: about.words,
      formula: 'amount',
      inputs: [usdInput('amount', about.label, amountCents, about.source)],
      unit: 'USD',
      basis: kind === 'received' ? 'entered' : 'billed',
    },
  };
}

/** Earned less received by a day; below zero when more came than was earned. */
export function incentiveOwed(incentive: IncentiveFacts, cycles: readonly IncentiveCycle[], on: Day): Figure {
  const by = (entry: UnplacedEntry) => entry.date <= on;
  return owedFigure(
    incentiveEarned(incentive, cycles)
      .filter(by)
      .map((entry) => entry.amountCents),
    incentiveReceived(incentive, cycles)
      .filter(by)
      .map((entry) => entry.amountCents),
  );
}

/** The same from the amounts of the book's own entries. */
export function owedFigure(earned: readonly Cents[], received: readonly Cents[]): Figure {
  const totalEarned = sumCents(earned);
  const totalReceived = sumCents(received);
  return {
    amountCents: cents(totalEarned - totalReceived),
    working: {
      words: `${sayMoney(totalEarned)} earned − ${sayMoney(totalReceived)} received`,
      formula: 'sum(earned) - sum(received)',
      inputs: [
        usdListInput('earned', `Earned in ${earned.length} cycles`, earned, stated('Incentive earned')),
        usdListInput('received', `${received.length} receipts`, received, stated('Incentive received')),
      ],
      unit: 'USD',
      basis: 'computed',
    },
  };
}
