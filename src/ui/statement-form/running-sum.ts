import { isElectric } from '#shared/reconcile/electric-lines.ts';
import { type Cents, cents, parseDollars } from '#shared/units/cents.ts';
import { isUntouched, type StatementFormValues } from './statement-values.ts';

export type RunningSum = { linesCents: Cents; dueCents: Cents | null; unread: number };

/**
 * What the typed lines in the amount due come to with the balance and payments, in whole cents; lines that do not read are counted apart, lines
 * not touched are left out. On a budget plan its amount and settlement stand in place of the lines for electricity.
 */
export function runningSum(
  form: Pick<StatementFormValues, 'lines' | 'previousBalance' | 'payments' | 'due' | 'budget' | 'budgetSettled'>,
): RunningSum {
  let total = 0;
  let unread = 0;
  const add = (amount: string, needed: boolean) => {
    const value = parseDollars(amount);
    if (value !== null) total += value;
    else if (needed || amount.trim() !== '') unread += 1;
  };
  const onBudget = form.budget.trim() !== '';
  for (const line of form.lines) {
    if (line.inDue && !isUntouched(line) && !(onBudget && isElectric(line))) add(line.amount, true);
  }
  if (onBudget) {
    add(form.budget, true);
    add(form.budgetSettled, false);
  }
  add(form.previousBalance, false);
  add(form.payments, false);
  return { linesCents: cents(total), dueCents: parseDollars(form.due), unread };
}
