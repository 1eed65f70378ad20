import { totalBalance } from '../ledger/opening-total.ts';
import { sayDay } from '../ledger/say.ts';
import { printedBankId } from '../ledger/settle-cycle.ts';
import type { RatePlan } from '../settlement/plan.ts';
import type { Day } from '../units/day.ts';
import { Exact, exact } from '../units/rate.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareDecimals, type Difference, nothingToCompare } from './make-check.ts';

/** A printed balance of kWh is whole; one of dollars is to the cent. */
const TOLERANCE = { kWh: '1', USD: '0.01' } as const;

/**
 * For each printed bank: it opens with what the last statement closed with, in its unit (nothing lost at a rate change or a true-up), and it closes with
 * open + earned − used − expired − paid as settled on the billed kWh (net-metering.md §4 "lost at rate change", "missed rollover").
 */
export function bankChainChecks(context: CheckContext): Check[] {
  const { paper, settled, before } = context;
  if (settled.plan === null) return [];
  const { plan } = settled.plan;
  const checks: Check[] = [];
  for (const printed of paper.statement.banks) {
    const { open, close } = printed;
    const id = printedBankId(printed, plan);
    const label = plan.banks.find((bank) => bank.id === id)?.label ?? printed.bank;
    const about = id ?? printed.bank;
    const last = lastClose(context, about, plan);
    const opens = `${label}: opens as the last cycle closed`;
    if (open === null || last === null) {
      checks.push(
        nothingToCompare('bankChain', about, printed.unit, {
          title: opens,
          stated: open,
          found: last?.amount ?? null,
          cause:
            before === null ? 'This is the first cycle.' : 'One of the two statements does not print this balance.',
        }),
      );
    } else {
      checks.push(
        compare(about, printed.unit, open, last.amount, opens, () => ({
          cause: `It closed at ${amount(last.amount, printed.unit)} on ${sayDay(last.on)} and opens at ${amount(open, printed.unit)}.`,
          advice: 'Ask the utility what became of the balance, and for it to be put back.',
        })),
      );
    }
    const closes = `${label}: closes as it should`;
    const settledClose = paper.split === null ? closeOf(context, about) : null;
    if (close === null || settledClose === null) {
      checks.push(
        nothingToCompare('bankChain', `${about}.close`, printed.unit, {
          title: closes,
          stated: close,
          found: settledClose,
          cause:
            close === null
              ? 'The statement prints no closing balance.'
              : 'The cycle cannot be settled on the billed kWh.',
        }),
      );
    } else {
      checks.push(
        compare(`${about}.close`, printed.unit, close, settledClose, closes, () => ({
          cause: `On the billed kWh it should close at ${amount(settledClose, printed.unit)}; the statement prints ${amount(close, printed.unit)}.`,
          advice: 'Ask the utility how it came to the closing balance.',
        })),
      );
    }
  }
  return checks;
}

/**
 * What the last statement printed as the bank's close, by the plan it was billed on (by this cycle's where none was known then), else as the ledger
 * carried it; null where neither says, and for the first statement.
 */
function lastClose(
  { paper: { previous }, before }: CheckContext,
  id: string,
  plan: RatePlan,
): { amount: string; on: Day } | null {
  if (previous === null) return null;
  const billedOn = before?.plan?.plan ?? plan;
  const printed =
    previous.banks.find((bank) => printedBankId(bank, billedOn) === id || bank.bank === id)?.close ?? null;
  if (printed !== null) return { amount: printed, on: previous.to };
  const carried = before?.ours?.closing.banks[id];
  return carried === undefined ? null : { amount: totalBalance(carried).toString(), on: previous.to };
}

function closeOf({ settled }: CheckContext, id: string): string | null {
  const moves = settled.asBilled?.settlement.banks.filter((bank) => bank.bank === id) ?? [];
  if (moves.length === 0) return null;
  return moves.reduce((sum, bank) => sum.plus(exact(bank.move.close)), new Exact(0)).toString();
}

function compare(
  about: string,
  unit: 'kWh' | 'USD',
  stated: string,
  found: string,
  title: string,
  differs: () => Difference,
): Check {
  return compareDecimals('bankChain', about, title, { stated, found, tolerance: TOLERANCE[unit], unit }, differs);
}

function amount(value: string, unit: 'kWh' | 'USD'): string {
  return unit === 'USD' ? `$${value}` : `${value} kWh`;
}
