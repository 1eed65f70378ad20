import type { PrintedLine } from '../facts/papers.ts';
import { totalBalance } from '../ledger/opening-total.ts';
import { sayDate } from '../ledger/say.ts';
import { printedBankId } from '../ledger/settle-cycle.ts';
import type { PlanBank, RatePlan } from '../settlement/plan.ts';
import { dollarsText } from '../units/cents.ts';
import { type Exact, exact } from '../units/rate.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareDecimals, compareText } from './make-check.ts';

/** A balance that is said again is the same to a kWh or a cent. */
const TOLERANCE = { kWh: '1', USD: '0.01' } as const;
/** Kinds of lines by which a balance may be paid, expire or move. */
const ENDS: ReadonlySet<PrintedLine['kind']> = new Set(['trueup', 'credit', 'export', 'adjustment']);

/**
 * At a change of plan each bank that held something goes on under the new plan, or the statement says what became of it: another bank that opens with just so much,
 * or a line of just so many kWh or dollars. One that the new plan keeps is compared by the bank's own check.
 */
export function planChangeChecks(context: CheckContext): Check[] {
  const { before, settled } = context;
  const old = before?.plan;
  const now = settled.plan;
  if (!old || !now || old.from === now.from) return [];
  return old.plan.banks.flatMap((bank) => {
    const held = closeOf(context, bank, old.plan);
    if (held === null || held.isZero()) return [];
    return [bankCheck(context, bank, held, old.plan, now.plan)];
  });
}

function bankCheck(context: CheckContext, bank: PlanBank, held: Exact, old: RatePlan, now: RatePlan): Check {
  const title = `Change of rate plan: what became of ${bank.label}`;
  const about = `plan.${bank.id}`;
  if (now.banks.some((other) => other.id === bank.id && other.unit === bank.unit)) {
    const kept = { stated: 'carried on', found: 'carried on', difference: null, unit: 'text' as const };
    return compareText('nothingLost', about, title, kept, () => ({ cause: null, advice: null }));
  }
  const said = movedTo(context, bank, held, old, now) ?? endedBy(context, bank, held);
  const amount = held.toString();
  const sides = {
    stated: said === null ? '0' : amount,
    found: amount,
    tolerance: TOLERANCE[bank.unit],
    unit: bank.unit,
  };
  const check = compareDecimals('nothingLost', about, title, sides, () => ({
    cause: `${bank.unit === 'kWh' ? `${amount} kWh` : `$${amount}`} of credit disappeared when the plan changed on ${sayDate(context.paper.from)}: the new plan has no such bank, and nothing on the statement pays, expires or moves it.`,
    advice: 'Ask the utility what became of the balance. The old plan’s sheet says what is due at its end.',
  }));
  return { ...check, cause: said ?? check.cause };
}

/** What the bank held at the last close: as printed, else as the ledger carried it; null where neither says. */
function closeOf({ paper, before }: CheckContext, bank: PlanBank, old: RatePlan): Exact | null {
  const printed = paper.previous?.banks.find((one) => printedBankId(one, old) === bank.id)?.close ?? null;
  if (printed !== null) return exact(printed);
  const carried = before?.ours?.closing.banks[bank.id];
  return carried === undefined ? null : totalBalance(carried);
}

function movedTo({ paper }: CheckContext, bank: PlanBank, held: Exact, old: RatePlan, now: RatePlan): string | null {
  const moved = paper.statement.banks.find(({ unit, open, ...printed }) => {
    const id = printedBankId({ ...printed, unit }, now);
    // A bank both plans have opens with its own balance.
    const own = old.banks.some((other) => other.id === id && other.id !== bank.id);
    return unit === bank.unit && open !== null && !own && isNear(exact(open), held, bank.unit);
  });
  return moved === undefined ? null : `The statement opens “${moved.bank}” with it.`;
}

function endedBy({ paper }: CheckContext, bank: PlanBank, held: Exact): string | null {
  const line = paper.statement.lines.find(({ kind, unit, quantity, amountCents }) => {
    if (!ENDS.has(kind)) return false;
    if (bank.unit === 'USD') return isNear(exact(dollarsText(amountCents)).abs(), held, 'USD');
    return unit === 'kWh' && quantity !== null && isNear(exact(quantity).abs(), held, 'kWh');
  });
  return line === undefined ? null : `The line “${line.label}” accounts for it.`;
}

function isNear(a: Exact, b: Exact, unit: 'kWh' | 'USD'): boolean {
  return a.minus(b).abs().lte(TOLERANCE[unit]);
}
