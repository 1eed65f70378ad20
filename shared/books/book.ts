import * as z from 'zod/mini';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { workingSchema } from '../working.ts';

/** A book is one stream of money. */
export const bookId = z.enum(['billAvoided', 'incentive', 'insurance', 'credit', 'loan', 'upkeep', 'costs']);
export type BookId = z.infer<typeof bookId>;

/** The order in which the books stand wherever they are listed. */
export const BOOKS: readonly BookId[] = ['billAvoided', 'incentive', 'insurance', 'credit', 'loan', 'upkeep', 'costs'];

/**
 * `cash`: money moved. `avoided`: money that would have moved. `memo`: shown, never summed.
 */
export const entryBasis = z.enum(['cash', 'avoided', 'memo']);
export type EntryBasis = z.infer<typeof entryBasis>;

/** Which cycle an entry falls in: the cycle's `to`, or before the first or since the last cycle. */
export const cycleKey = z.union([daySchema, z.literal('before'), z.literal('since')]);
export type CycleKey = z.infer<typeof cycleKey>;

/** One dated line in a book; positive is kept or received, negative is paid. */
export const entrySchema = z.object({
  id: z.string(),
  date: daySchema,
  cycle: cycleKey,
  book: bookId,
  /** Finer than the book: `payment`, `extraPrincipal`, `earned`, `received`, `premium`, a cost's kind … */
  kind: z.string(),
  label: z.string(),
  amountCents: centsSchema,
  basis: entryBasis,
  /** True where the figure is an estimate (use or bill by a fallback, a split first statement). */
  estimated: z.boolean(),
  working: workingSchema,
});
export type Entry = z.infer<typeof entrySchema>;

/** An entry before it has been placed in a cycle. */
export type UnplacedEntry = Omit<Entry, 'cycle'>;
