import * as z from 'zod/mini';
import { needSchema } from '../ledger/need.ts';
import { positionSchema } from '../position/position.ts';
import { daySchema } from '../units/day.ts';
import { endpoint, HOUSEHOLD } from './endpoint.ts';

export const positionView = z.object({
  householdName: z.string(),
  utility: z.string(),
  /** Null before the first cycle is posted. */
  lastCycle: z.nullable(z.object({ from: daySchema, to: daySchema })),
  counts: z.object({ cycles: z.int(), balanced: z.int(), differs: z.int(), accepted: z.int(), open: z.int() }),
  position: positionSchema,
  needs: z.array(needSchema),
  /** Set-up steps still open or skipped, by step id: what would make the figures more complete. */
  unfinishedSteps: z.array(z.string()),
  sample: z.boolean(),
});
export type PositionView = z.infer<typeof positionView>;

export const positionApi = {
  view: endpoint({
    method: 'GET',
    path: '/api/households/:householdId/position',
    access: HOUSEHOLD,
    response: positionView,
  }),
};
