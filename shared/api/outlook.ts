import * as z from 'zod/mini';
import { assumptionsSchema } from '../facts/household.ts';
import { carbonSchema, handbookSchema, rangeSchema } from '../position/outlook.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** What the position is expected to come to: the range of the projection, the handbook figures, the carbon, and what all of it takes for granted. */
export const outlookView = z.object({
  range: z.nullable(rangeSchema),
  /** Why there is no range, in a sentence; null where there is one. */
  whyNoRange: z.nullable(z.string()),
  /** Null while nothing can be projected. */
  handbook: z.nullable(handbookSchema),
  carbon: z.nullable(carbonSchema),
  assumptions: assumptionsSchema,
});
export type OutlookView = z.infer<typeof outlookView>;

export const outlookApi = {
  view: endpoint({
    method: 'GET',
    path: '/api/households/:householdId/outlook',
    access: HOUSEHOLD,
    response: outlookView,
  }),
  saveAssumptions: endpoint({
    method: 'PUT',
    path: '/api/households/:householdId/assumptions',
    access: OWNER,
    body: assumptionsSchema,
    response: outlookView,
  }),
};
