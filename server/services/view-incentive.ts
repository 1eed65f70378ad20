import type { MoneyView } from '#shared/api/money.ts';
import type { Entry } from '#shared/books/book.ts';
import { incentiveLeft } from '#shared/books/incentive-left.ts';
import { matchIncentive } from '#shared/books/incentive-match.ts';
import { estimateOf } from '#shared/metering/expected-production.ts';
import { sumCents } from '#shared/units/cents.ts';
import type { HouseholdLedger } from './ledger-of.ts';

/** The incentive as it stands: earned by cycle and which cheque pays it, what is owed, and what is left of the term. */
export function viewIncentive({ facts, ledger, today }: HouseholdLedger): MoneyView['incentive'] {
  const { incentive, house, assumptions } = facts;
  if (incentive === null) return null;
  const own = ledger.entries.filter((entry) => entry.book === 'incentive');
  const isMemo = (entry: Entry) => entry.basis === 'memo';
  const cycleFrom = new Map(ledger.cycles.map((cycle) => [cycle.to, cycle.from]));
  const earned = own.filter(isMemo);
  // What the bill credits pays its own cycle; a cheque pays the cycles it says, else the oldest.
  const received =
    incentive.paidAs === 'separate'
      ? incentive.received.filter((receipt) => receipt.on <= today)
      : own
          .filter((entry) => !isMemo(entry))
          .map(({ id, date, amountCents }) => ({
            id,
            on: date,
            amountCents,
            from: cycleFrom.get(date) ?? null,
            to: date,
          }));
  const match = matchIncentive(
    earned.map((entry) => ({
      from: cycleFrom.get(entry.date) ?? entry.date,
      to: entry.date,
      earnedCents: entry.amountCents,
    })),
    received,
  );
  return {
    facts: incentive,
    earnedCents: sumCents(earned.map((entry) => entry.amountCents)),
    receivedCents: sumCents(own.filter((entry) => !isMemo(entry)).map((entry) => entry.amountCents)),
    owedCents: ledger.position.settledParts.incentiveOwed.amountCents,
    cycles: earned.map((entry, at) => {
      const matched = match.cycles[at];
      return {
        from: matched?.from ?? entry.date,
        earned: entry,
        paidBy:
          matched?.parts.map(({ receipt, on, amountCents, stated }) => ({ receipt, on, amountCents, stated })) ?? [],
        owedCents: matched?.owedCents ?? entry.amountCents,
      };
    }),
    unmatchedCents: match.unmatchedCents,
    left: incentiveLeft(incentive, estimateOf(house, assumptions.degradation), today),
  };
}
