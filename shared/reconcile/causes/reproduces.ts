import type { SettledAmounts } from '../../settlement/settle.ts';
import type { CycleUsage, SettledBank } from '../../settlement/settlement.ts';
import { Exact } from '../../units/rate.ts';
import { lastDigit } from '../tolerance.ts';
import type { BilledBank, BilledCycle, BilledLine } from './cause.ts';

/** Lines of one component taken together: a price that changes inside a cycle may be printed as one line or as several. */
type Sum = { component: string; cents: number; lines: Comparable[] };
type Comparable = Pick<BilledLine, 'component' | 'kind' | 'quantity' | 'unit' | 'amountCents'>;

/** A billed cycle with its lines and payouts added up by component, once for all trials. */
export type BilledSums = {
  billed: BilledCycle;
  lines: ReadonlyMap<string, Sum> | null;
  payouts: ReadonlyMap<string, number> | null;
};

const MOVES = ['open', 'earned', 'used', 'expired', 'paid', 'close'] as const;
/** Stands for the amount due among what differs. */
const DUE = 'amount due';

export function billedSums(billed: BilledCycle): BilledSums {
  return {
    billed,
    lines: billed.lines === null ? null : sumLines(billed.lines),
    payouts: billed.payouts === null ? null : sumPayouts(billed.payouts),
  };
}

/**
 * Whether a settled cycle is what was billed: the amount due, each component's lines to the cent and their kWh, each bank and each payout. What is
 * not known of the bill is not compared.
 */
export function reproducesMoney(sums: BilledSums, { settlement }: Pick<SettledAmounts, 'settlement'>): boolean {
  return differing(sums, settlement, true).size === 0;
}

/** The components and banks of a settled cycle that were billed otherwise. */
export function billedOtherwise(sums: BilledSums, { settlement }: Pick<SettledAmounts, 'settlement'>): Set<string> {
  return differing(sums, settlement, false);
}

/** The components and banks of a settled cycle that the bill does not speak of. */
export function leftUnsaid(sums: BilledSums, { settlement }: Pick<SettledAmounts, 'settlement'>): Set<string> {
  const lines = settlement.lines.map((line) => line.component).filter((id) => isUnsaid(sums, id, settlement));
  const banks = settlement.banks.map(({ bank }) => bank);
  return new Set([...lines, ...banks.filter((id) => sums.billed.banks.every((one) => one.bank !== id))]);
}

/** Whether the kWh printed beside the registers are those of a usage; what is not printed is not compared. */
export function reproducesKwh(billed: BilledCycle, usage: CycleUsage): boolean {
  const same = (printed: number | null, ours: number | null) => printed === null || ours === null || printed === ours;
  return (
    same(billed.importWh, usage.importWh) &&
    same(billed.exportWh, usage.exportWh) &&
    same(billed.productionWh, usage.productionWh)
  );
}

function differing(sums: BilledSums, settlement: SettledAmounts['settlement'], onlyFirst: boolean): Set<string> {
  const { billed } = sums;
  const found = new Set<string>();
  if (billed.amountDueCents !== null && billed.amountDueCents !== settlement.amountDueCents) {
    found.add(DUE);
    if (onlyFirst) return found;
  }
  if (sums.lines) {
    const ours = sumLines(settlement.lines);
    for (const [key, mine] of ours) {
      const theirs = sums.lines.get(key);
      if (theirs ? sameSum(theirs, mine) : mine.cents === 0 || isUnsaid(sums, mine.component, settlement)) continue;
      found.add(mine.component);
      if (onlyFirst) return found;
    }
    for (const [key, theirs] of sums.lines) if (theirs.cents !== 0 && !ours.has(key)) found.add(theirs.component);
  }
  if (sums.payouts) {
    const ours = sumPayouts(settlement.payouts);
    for (const [id, cents] of sums.payouts) if ((ours.get(id) ?? 0) !== cents) found.add(id);
    for (const [id, cents] of ours) if ((sums.payouts.get(id) ?? 0) !== cents) found.add(id);
  }
  for (const bank of billed.banks) if (!sameBank(bank, settlement.banks)) found.add(bank.bank);
  return found;
}

function sumLines(lines: readonly Comparable[]): Map<string, Sum> {
  const sums = new Map<string, Sum>();
  for (const line of lines) {
    if (line.kind === 'previousBalance' || line.kind === 'payment') continue;
    const key = line.kind === 'trueup' ? `${line.component} trueup` : line.component;
    const sum = sums.get(key);
    if (sum) {
      sum.cents += line.amountCents;
      sum.lines.push(line);
    } else sums.set(key, { component: line.component, cents: line.amountCents, lines: [line] });
  }
  return sums;
}

function sumPayouts(payouts: readonly { component: string; amountCents: number }[]): Map<string, number> {
  const sums = new Map<string, number>();
  for (const { component, amountCents } of payouts) sums.set(component, (sums.get(component) ?? 0) + amountCents);
  return sums;
}

/** A component that is in no amount due (a credit put into a bank) may be left out of a statement: its bank says the same. */
function isUnsaid(sums: BilledSums, component: string, { lines }: SettledAmounts['settlement']): boolean {
  return !sums.lines?.has(component) && lines.every((line) => line.component !== component || !line.inDue);
}

function sameSum(theirs: Sum, mine: Sum): boolean {
  if (theirs.cents !== mine.cents) return false;
  if (theirs.lines.length === mine.lines.length && theirs.lines.length > 1 && !sameAmounts(theirs, mine)) return false;
  return sameQuantity(theirs.lines, mine.lines);
}

function sameAmounts(theirs: Sum, mine: Sum): boolean {
  const sorted = (sum: Sum) => sum.lines.map((line) => line.amountCents).sort((a, b) => a - b);
  const ours = sorted(mine);
  return sorted(theirs).every((amount, at) => amount === ours[at]);
}

/** The quantities of a component in all, where all are printed and in one unit. */
function sameQuantity(theirs: readonly Comparable[], mine: readonly Comparable[]): boolean {
  const units = new Set([...theirs, ...mine].map((line) => line.unit));
  const printed = quantitiesOf(theirs);
  const ours = quantitiesOf(mine);
  if (units.size > 1 || printed === null || ours === null || printed.join() === ours.join()) return true;
  const tolerance = units.has('USD') ? new Exact(0) : sumOf(printed.map(lastDigit));
  return sumOf(printed).minus(sumOf(ours)).abs().lte(tolerance);
}

function quantitiesOf(lines: readonly Comparable[]): string[] | null {
  const texts = lines.flatMap((line) => line.quantity ?? []);
  return texts.length < lines.length ? null : texts;
}

/** Sizes, since a statement may print the kWh of a credit with either sign. */
function sumOf(figures: readonly (string | Exact)[]): Exact {
  return figures.reduce<Exact>((sum, figure) => sum.plus(new Exact(figure).abs()), new Exact(0));
}

function sameBank(printed: BilledBank, banks: readonly SettledBank[]): boolean {
  const ours = banks.find((bank) => bank.bank === printed.bank && bank.period === printed.period);
  if (!ours) return false;
  return MOVES.every((move) => {
    const said = printed[move];
    if (said === null || said === ours.move[move]) return true;
    const tolerance = ours.unit === 'USD' ? new Exact(0) : lastDigit(said);
    return new Exact(said).minus(ours.move[move]).abs().lte(tolerance);
  });
}
