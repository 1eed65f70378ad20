import * as z from 'zod/mini';
import type { Opening } from '#shared/settlement/settlement.ts';
import { plainDecimal, typed } from '#src/lib/typed-values.ts';
import { entryFaults, type PlanEntry } from '#src/ui/plan-form/plan-entry.ts';

const entry = z
  .custom<PlanEntry>(() => true)
  .check((context) => {
    for (const { path, message } of entryFaults(context.value)) {
      context.issues.push({ code: 'custom', input: context.value, path: path.split('.'), message });
    }
  });

/** The set-up's plans, and what the utility's books held before the first cycle. */
export const planEntries = z.object({
  plans: z.array(entry).check(z.minLength(1)),
  /** What the first bank held before the first cycle, in its unit. */
  openingBank: typed.rateOrNone,
  openingBalance: typed.moneyOrNone,
});
export type PlanEntries = z.infer<typeof planEntries>;

/** The opening with the first bank's credit and the account's balance as typed; whatever else it holds stays. */
export function openingWith(
  opening: Opening,
  bank: string | null,
  credit: string,
  balanceCents: Opening['balanceCents'],
): Opening {
  const text = plainDecimal(credit);
  if (bank === null) return { ...opening, balanceCents };
  const { [bank]: _, ...others } = opening.banks;
  return { ...opening, balanceCents, banks: text === null ? others : { ...others, [bank]: text } };
}
