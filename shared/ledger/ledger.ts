import * as z from 'zod/mini';
import { entrySchema } from '../books/book.ts';
import { creditLines } from '../books/credit-lines.ts';
import { projectionBasis } from '../position/basis.ts';
import { positionSchema } from '../position/position.ts';
import { daySchema } from '../units/day.ts';
import { cycleSchema } from './cycle.ts';
import { needSchema } from './need.ts';

/** The whole ledger of a household: what `npm run ledger` prints and the server shows. */
export const ledgerSchema = z.object({
  today: daySchema,
  cycles: z.array(cycleSchema),
  entries: z.array(entrySchema),
  creditLines: z.array(creditLines),
  position: positionSchema,
  /** What the projection starts from, to be projected again with changes; null where there is no projection. */
  basis: z.nullable(projectionBasis),
  needs: z.array(needSchema),
});
export type Ledger = z.infer<typeof ledgerSchema>;
