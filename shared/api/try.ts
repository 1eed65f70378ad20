import * as z from 'zod/mini';
import { leversSchema, scenarioSchema } from '../facts/scenario.ts';
import { projectionBasis } from '../position/basis.ts';
import { daySchema } from '../units/day.ts';
import { endpoint, HOUSEHOLD, OWNER } from './endpoint.ts';

/** Mean Wh a day sent out in each hour of the day, by calendar month, January first. */
export const hourlyExport = z.object({
  months: z.array(z.array(z.number().check(z.minimum(0))).check(z.length(24))).check(z.length(12)),
  /** `intervals`: from the house's own export readings; `assumed`: a stated shape, since there are none by the hour. */
  from: z.enum(['intervals', 'assumed']),
});

export const tryView = z.object({
  today: daySchema,
  /** Null while nothing can be projected; `why` then says what to do. */
  basis: z.nullable(projectionBasis),
  why: z.nullable(z.string()),
  hourly: hourlyExport,
  scenarios: z.array(scenarioSchema),
});
export type TryView = z.infer<typeof tryView>;

export const scenarioBody = z.strictObject({ name: scenarioSchema.shape.name, levers: leversSchema });

const at = '/api/households/:householdId/try';
export const tryApi = {
  view: endpoint({ method: 'GET', path: at, access: HOUSEHOLD, response: tryView }),
  /** Keeps a change by name; the same id again changes it. */
  keep: endpoint({ method: 'PUT', path: `${at}/scenarios/:id`, access: OWNER, body: scenarioBody, response: tryView }),
  remove: endpoint({ method: 'DELETE', path: `${at}/scenarios/:id`, access: OWNER, response: tryView }),
};
