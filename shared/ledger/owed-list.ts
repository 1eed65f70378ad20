import * as z from 'zod/mini';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { workingSchema } from '../working.ts';

/** One cycle's part of what stands between the house and the utility; positive is owed to the house. */
export const owedRow = z.object({
  from: daySchema,
  to: daySchema,
  /** Why, in sentences: what was found by trying, else what the differing check says. */
  causes: z.array(z.string()),
  /** Billed too much (positive) or too little. */
  dueCents: centsSchema,
  /** Missing from the dollar bank at the close (positive) or too much in it. */
  bankCents: centsSchema,
  /** kWh missing from a kWh bank at the close, as decimal text; null where there is none or it is right. */
  bankKwh: z.nullable(z.string()),
  amountCents: centsSchema,
  /** Accepted with a note: shown, and left out of the total. */
  accepted: z.boolean(),
  /** Sum of the rows so far that are not accepted. */
  runningCents: centsSchema,
  working: workingSchema,
});
export type OwedRow = z.infer<typeof owedRow>;

export const owedList = z.object({
  rows: z.array(owedRow),
  totalCents: centsSchema,
  /** kWh missing from banks, not accepted, as decimal text. */
  totalKwh: z.string(),
  working: workingSchema,
});
export type OwedList = z.infer<typeof owedList>;
