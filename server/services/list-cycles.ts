import type { CycleRow } from '#shared/api/cycles.ts';
import { BOOKS, type BookId, type Entry } from '#shared/books/book.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { owedOf } from '#shared/ledger/owed.ts';
import type { OwedList } from '#shared/ledger/owed-list.ts';
import { type Cents, parseDollars, sumCents } from '#shared/units/cents.ts';
import { parseKwh, sumWh, type Wh } from '#shared/units/energy.ts';
import type { Deps } from '../deps.ts';
import { ledgerOf } from './ledger-of.ts';

function bookSum(entries: readonly Entry[], book: BookId): Cents {
  return sumCents(
    entries.filter((entry) => entry.book === book && entry.basis !== 'memo').map((entry) => entry.amountCents),
  );
}

/** Closing balances in a unit: as the statement prints them, else as computed; empty where there is no such bank. */
function closing(cycle: Cycle, unit: 'kWh' | 'USD'): string[] {
  const printed = cycle.statement.banks.filter((bank) => bank.unit === unit).map((bank) => bank.close);
  const known = printed.filter((text) => text !== null);
  if (known.length > 0 && known.length === printed.length) return known;
  return (cycle.settlement?.banks ?? []).filter((bank) => bank.unit === unit).map((bank) => bank.move.close);
}

function bankCents(cycle: Cycle): Cents | null {
  const amounts = closing(cycle, 'USD').map(parseDollars);
  const known = amounts.filter((amount) => amount !== null);
  return known.length === 0 || known.length < amounts.length ? null : sumCents(known);
}

function bankWh(cycle: Cycle): Wh | null {
  const amounts = closing(cycle, 'kWh').map(parseKwh);
  const known = amounts.filter((amount) => amount !== null);
  return known.length === 0 || known.length < amounts.length ? null : sumWh(known);
}

/** The checks that differ and are not accepted, in a few words each. */
export function differingChecks(cycle: Pick<Cycle, 'checks'>): string[] {
  return cycle.checks
    .filter((check) => check.verdict === 'differs' && check.accepted === null)
    .map((check) => (check.cause === null ? check.title : `${check.title}: ${check.cause}`));
}

export function cycleRowOf(cycle: Cycle): CycleRow {
  const { energy, entries } = cycle;
  return {
    from: cycle.from,
    to: cycle.to,
    days: cycle.days,
    productionWh: energy.production?.wh ?? null,
    selfUseWh: energy.selfUse?.wh ?? null,
    exportWh: energy.export?.wh ?? null,
    importWh: energy.import?.wh ?? null,
    billedCents: cycle.billedDueCents,
    oursCents: cycle.oursDueCents,
    bankCents: bankCents(cycle),
    bankWh: bankWh(cycle),
    incentiveCents: bookSum(entries, 'incentive'),
    loanCents: bookSum(entries, 'loan'),
    avoidedCents: bookSum(entries, 'billAvoided'),
    addedCents: cycle.addedCents,
    state: cycle.state,
    provisional: cycle.provisional,
    estimated: entries.some((entry) => entry.estimated),
    differs: cycle.checks.find((check) => check.verdict === 'differs' && check.accepted === null)?.title ?? null,
  };
}

/** Every cycle as a row, oldest first, the books that hold anything, and what stands between the house and the utility. */
export function listCycles(
  deps: Pick<Deps, 'db' | 'clock'>,
  householdId: string,
): { rows: CycleRow[]; books: BookId[]; owed: OwedList } {
  const { ledger } = ledgerOf(deps, householdId);
  const used = new Set(ledger.entries.map((entry) => entry.book));
  return {
    rows: ledger.cycles.map(cycleRowOf),
    books: BOOKS.filter((book) => used.has(book)),
    owed: owedOf(ledger.cycles),
  };
}
