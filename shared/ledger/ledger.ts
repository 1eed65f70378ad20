import * as z from 'zod/mini';
import { entrySchema } from '../books/book.ts';
import { creditLines } from '../books/credit-lines.ts';
import { positionSchema } from '../position/position.ts';
import { daySchema } from '../units/day.ts';
import { cycleSchema } from './cycle.ts';

/** One thing that asks for the owner. `tone` bad: something is wrong; note: something is next. */
export const needSchema = z.object({
  key: z.string(),
  tone: z.enum(['bad', 'note']),
  title: z.string(),
  detail: z.string(),
  /** In-app path to where it is dealt with, relative to the household (`cycles/2026-09-14`, `log`). */
  link: z.nullable(z.string()),
});
export type Need = z.infer<typeof needSchema>;

/** The whole ledger of a household: what `npm run ledger` prints and the server shows. */
export const ledgerSchema = z.object({
  today: daySchema,
  cycles: z.array(cycleSchema),
  entries: z.array(entrySchema),
  creditLines: z.array(creditLines),
  position: positionSchema,
  needs: z.array(needSchema),
});
export type Ledger = z.infer<typeof ledgerSchema>;
