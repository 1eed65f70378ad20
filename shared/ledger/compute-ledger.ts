import { billAvoidedEntry, sharedCreditEntry } from '../books/bill-avoided.ts';
import type { Entry, UnplacedEntry } from '../books/book.ts';
import { costEntries } from '../books/costs.ts';
import { type IncentiveCycle, incentiveEarned, incentiveReceived } from '../books/incentive.ts';
import { leaseEntries } from '../books/lease.ts';
import { insuranceEntries } from '../books/mortgage-insurance.ts';
import { loanEntriesWithPapers, otherLoanEntries } from '../books/other-money.ts';
import { creditEntries, creditLinesOf } from '../books/tax-credit.ts';
import type { HouseholdFacts } from '../facts/household.ts';
import { isComplete } from '../metering/cycle-energy.ts';
import { type HourlyProfile, hourlyProfileOf } from '../metering/hourly-profile.ts';
import { computePosition } from '../position/compute-position.ts';
import { placeEntries } from '../position/place.ts';
import { isIncentiveInBill } from '../reconcile/electric-lines.ts';
import { cents, sumCents } from '../units/cents.ts';
import { addMonths, type Day } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import type { Cycle, EnergyFigure } from './cycle.ts';
import { type Assembled, type AssembledCycle, assembleCycles } from './cycles.ts';
import type { Ledger } from './ledger.ts';
import { needsOf } from './needs.ts';

/**
 * The whole ledger of a household, from its facts alone (ledger.md §2): papers → cycles → settlement, facing lines and checks → entries of
 * every book → position → what needs the owner. Pure and in one direction. Entries run through `today`.
 */
export function computeLedger(facts: HouseholdFacts, { today }: { today: Day }): Ledger {
  return postLedger(facts, assembleCycles(facts), today);
}

/** From assembled cycles to the ledger: the entries of every book, placed; the position over them; what needs the owner. */
export function postLedger(
  facts: HouseholdFacts,
  { cycles: assembled, closing, plans }: Assembled,
  today: Day,
): Ledger {
  const dates = assembled.map((one) => one.cycle);
  const entries = placeEntries(unplacedEntries(facts, assembled, today), dates);
  const creditLines = facts.credit === null ? [] : creditLinesOf(facts.credit);
  const { position, basis } = computePosition({
    facts: plans.every((plan, at) => plan === facts.plans[at]) ? facts : { ...facts, plans },
    today,
    entries,
    cycles: assembled.map(({ cycle, utilityBank, split }) => ({
      from: cycle.from,
      to: cycle.to,
      provisional: cycle.provisional,
      utilityBank,
      importWh: completeWh(cycle.energy.import),
      exportWh: completeWh(cycle.energy.export),
      productionWh: completeWh(cycle.energy.production),
      split,
    })),
    hourly: hourlyOf(facts, dates.at(-1)?.to ?? null),
    opening: closing,
  });
  return {
    today,
    cycles: postedCycles(dates, entries),
    entries,
    creditLines,
    position,
    basis,
    needs: needsOf({ facts, assembled, entries, creditLines, position, today }),
  };
}

/** Years of readings the mean day of a month is taken from: the house as it is now, not as it was. */
const HOURLY_YEARS = 3;

function hourlyOf(facts: HouseholdFacts, lastTo: Day | null): HourlyProfile | null {
  return lastTo === null ? null : hourlyProfileOf(facts.intervals, addMonths(lastTo, -12 * HOURLY_YEARS));
}

/** The cycles with their entries: the same objects as the ledger's, so that a figure has one working wherever it is shown. */
function postedCycles(cycles: readonly Cycle[], entries: readonly Entry[]): Cycle[] {
  const byTo = new Map<string, Entry[]>();
  for (const entry of entries) {
    const own = byTo.get(entry.cycle);
    if (own) own.push(entry);
    else byTo.set(entry.cycle, [entry]);
  }
  return cycles.map((cycle) => {
    const own = byTo.get(cycle.to) ?? [];
    return {
      ...cycle,
      entries: own,
      addedCents: sumCents(own.filter((entry) => entry.basis !== 'memo').map((entry) => entry.amountCents)),
      loanPayments: own.filter((entry) => entry.book === 'loan' && entry.kind === 'payment').length,
    };
  });
}

/** An energy that covers its whole cycle; the projection repeats no part of one. */
function completeWh(figure: EnergyFigure | null): Wh | null {
  return isComplete(figure) ? figure.wh : null;
}

function unplacedEntries(facts: HouseholdFacts, assembled: readonly AssembledCycle[], today: Day): UnplacedEntry[] {
  const entries: UnplacedEntry[] = [];
  for (const { cycle } of assembled) {
    const values = cycle.sentOut.flatMap(({ valueCents }) => (valueCents === null ? [] : [valueCents]));
    if (values.length > 0) entries.push(sharedCreditEntry(cycle.to, sumCents(values)));
    if (cycle.withoutRoof === null) continue;
    entries.push(
      billAvoidedEntry({
        from: cycle.from,
        to: cycle.to,
        withoutRoofCents: cycle.withoutRoof.amountCents,
        asItWasCents: cycle.asItWas.amountCents,
        method: cycle.withoutRoof.method,
        estimated: cycle.split || cycle.withoutRoof.working.basis === 'estimated',
      }),
    );
  }
  if (facts.incentive !== null) {
    const seen = assembled.map((one) => incentiveCycle(one, facts));
    entries.push(
      ...incentiveEarned(facts.incentive, seen),
      ...incentiveReceived(facts.incentive, seen, today, facts.documents),
    );
  }
  if (facts.loan !== null) entries.push(...loanEntriesWithPapers(facts.loan, today, facts.documents));
  entries.push(...otherLoanEntries(facts.otherLoans, today, facts.documents));
  if (facts.lease !== null) {
    entries.push(...leaseEntries(facts.lease, assembled.map(productionOf), today, facts.documents));
  }
  if (facts.mortgage !== null) entries.push(...insuranceEntries(facts.mortgage, today));
  if (facts.credit !== null) entries.push(...creditEntries(facts.credit, today, facts.documents));
  entries.push(...costEntries(facts.costs, today, facts.documents));
  return entries;
}

/** What a cycle made as a whole: an estimate where it is only the inverter's own count, null where a part of the cycle is not covered. */
export function productionOf({ cycle }: { cycle: Cycle }) {
  const production = isComplete(cycle.energy.production) ? cycle.energy.production : null;
  return {
    from: cycle.from,
    to: cycle.to,
    productionWh: production?.wh ?? null,
    estimated: production?.from === 'monitor' || production?.working.basis === 'estimated',
    source: production?.working.inputs[0]?.source ?? null,
  };
}

/** A cycle as the incentive counts it. */
function incentiveCycle(assembled: AssembledCycle, facts: HouseholdFacts): IncentiveCycle {
  const credited = assembled.paper.lines.filter((line) => isIncentiveInBill(line, facts.incentive));
  return {
    ...productionOf(assembled),
    billCreditCents: credited.length === 0 ? null : cents(-sumCents(credited.map((line) => line.amountCents))),
  };
}
