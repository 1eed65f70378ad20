import type { PrintedBank, PrintedBudget, PrintedLine, RegisterRead, Statement } from '#shared/facts/papers.ts';
import type { Cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { Wh } from '#shared/units/energy.ts';
import { decimal, fullDate, kwh, money } from '#src/lib/format.ts';

const NOTHING = 'nothing';

/** What one revision of a statement changed from the one before, a short line for each value. */
export function statementChanges(before: Statement, after: Statement): string[] {
  const changes: string[] = [];
  const compare = (name: string, old: string, now: string) => {
    if (old !== now) changes.push(`${name}: ${old} → ${now}`);
  };
  compare('From', fullDate(before.from), fullDate(after.from));
  compare('To', fullDate(before.to), fullDate(after.to));
  compare('Statement date', dayWords(before.statementOn), dayWords(after.statementOn));
  compare('Due date', dayWords(before.dueOn), dayWords(after.dueOn));
  compare('Days printed', countWords(before.printedDays), countWords(after.printedDays));
  compare('Import', energyWords(before.importWh), energyWords(after.importWh));
  compare('Export', energyWords(before.exportWh), energyWords(after.exportWh));
  compare('Production', energyWords(before.productionWh), energyWords(after.productionWh));
  pairs(before.reads, after.reads, readKey).forEach(([old, now]) => {
    const read = now ?? old;
    if (read) compare(`Read of ${read.meter}, ${read.channel}`, readWords(old), readWords(now));
  });
  pairs(before.lines, after.lines, (line) => line.label).forEach(([old, now]) => {
    const line = now ?? old;
    if (line) compare(line.label, lineWords(old), lineWords(now));
  });
  pairs(before.banks, after.banks, (bank) => bank.bank).forEach(([old, now]) => {
    compare('Credit bank', bankWords(old), bankWords(now));
  });
  compare('Previous balance', moneyWords(before.previousBalanceCents), moneyWords(after.previousBalanceCents));
  compare('Payments', moneyWords(before.paymentsCents), moneyWords(after.paymentsCents));
  compare('Budget amount', ...budgetWords(before, after, 'instalmentCents'));
  compare('Budget balance', ...budgetWords(before, after, 'balanceCents'));
  compare('Budget settlement', ...budgetWords(before, after, 'settledCents'));
  compare('Due', money(before.amountDueCents), money(after.amountDueCents));
  return changes;
}

/** Pairs items of two lists by key, in order; the nth of a key faces the nth. */
function pairs<T>(
  before: readonly T[],
  after: readonly T[],
  keyOf: (item: T) => string,
): [T | undefined, T | undefined][] {
  const left = [...after];
  const made: [T | undefined, T | undefined][] = before.map((item) => {
    const at = left.findIndex((one) => keyOf(one) === keyOf(item));
    return [item, at < 0 ? undefined : left.splice(at, 1)[0]];
  });
  return [...made, ...left.map((item): [undefined, T] => [undefined, item])];
}

function readKey(read: RegisterRead): string {
  return `${read.meter} ${read.channel}`;
}

function readWords(read: RegisterRead | undefined): string {
  if (!read) return NOTHING;
  const times = read.multiplier === '1' ? '' : ` × ${read.multiplier}`;
  return `${decimal(read.previous)} to ${decimal(read.current)}${times}, ${read.type}, ${fullDate(read.from)} to ${fullDate(read.to)}`;
}

function lineWords(line: PrintedLine | undefined): string {
  if (!line) return NOTHING;
  const quantity = line.quantity === null ? '' : `${decimal(line.quantity)}${line.unit ? ` ${line.unit}` : ''}`;
  const rate = line.rate === null ? '' : ` at ${decimal(line.rate)}`;
  const due = line.inDue ? '' : ', not in the amount due';
  return `${[quantity + rate, money(line.amountCents)].filter((part) => part !== '').join(', ')}${due}`;
}

function bankWords(bank: PrintedBank | undefined): string {
  if (!bank) return NOTHING;
  const side = (value: string | null) => (value === null ? NOTHING : `${decimal(value)} ${bank.unit}`);
  const sent = bank.sentOut === null ? '' : `, ${side(bank.sentOut)} sent to other service points`;
  const saved = bank.sentValueCents === null ? '' : `, ${money(bank.sentValueCents)} saved there`;
  return `${side(bank.open)} to ${side(bank.close)}${sent}${saved}`;
}

function budgetWords(before: Statement, after: Statement, name: keyof PrintedBudget): [string, string] {
  return [moneyWords(before.budget?.[name] ?? null), moneyWords(after.budget?.[name] ?? null)];
}

function dayWords(day: Day | null): string {
  return day === null ? NOTHING : fullDate(day);
}

function countWords(count: number | null): string {
  return count === null ? NOTHING : String(count);
}

function energyWords(amount: Wh | null): string {
  return amount === null ? NOTHING : `${kwh(amount)} kWh`;
}

function moneyWords(amount: Cents | null): string {
  return amount === null ? NOTHING : money(amount);
}
