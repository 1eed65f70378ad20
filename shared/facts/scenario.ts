import * as z from 'zod/mini';
import { ratePlanSchema } from '../settlement/plan.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';

/** What one change does to the months to come. Each lever is null while it is left alone; none touches the record. */
export const leversSchema = z.object({
  /** Extra principal on a day. */
  paydown: z._default(
    z.nullable(z.object({ on: daySchema, amountCents: centsSchema.check(z.minimum(1)), reamortize: z.boolean() })),
    null,
  ),
  /** The roof as if it had been bought with cash: the loan's principal less its dealer fee paid when the loan was funded, no loan. */
  cash: z._default(z.boolean(), false),
  refinance: z._default(
    z.nullable(
      z.object({
        on: daySchema,
        annualRate: decimalText,
        termMonths: z.int().check(z.minimum(1), z.maximum(480)),
        costsCents: centsSchema.check(z.minimum(0)),
      }),
    ),
    null,
  ),
  /** Yearly rise of prices, fraction. */
  priceRise: z._default(z.nullable(decimalText), null),
  /** From a day on, every credit for export keeps only this share of its price, fraction; netting by the kilowatt-hour is priced so too. */
  exportCut: z._default(z.nullable(z.object({ from: daySchema, keep: decimalText })), null),
  /** Another rate plan from a day on. */
  plan: z._default(z.nullable(z.object({ from: daySchema, plan: ratePlanSchema })), null),
  /** More use from a day on, Wh per day, between two hours of the day (`to` may lie past midnight): a car to charge. */
  moreUse: z._default(
    z.nullable(
      z.object({
        from: daySchema,
        whPerDay: whSchema,
        fromHour: z.int().check(z.minimum(0), z.maximum(23)),
        toHour: z.int().check(z.minimum(1), z.maximum(24)),
      }),
    ),
    null,
  ),
  /** Yearly loss of production, fraction. */
  degradation: z._default(z.nullable(decimalText), null),
  /** One cost on a day to come: an inverter replaced. */
  replacement: z._default(z.nullable(z.object({ on: daySchema, costCents: centsSchema.check(z.minimum(0)) })), null),
  /** The house sold on a day: every stream ends, the loan is paid off, and what the buyer pays for the roof comes in. */
  sale: z._default(z.nullable(z.object({ on: daySchema, roofValueCents: centsSchema.check(z.minimum(0)) })), null),
});
export type Levers = z.infer<typeof leversSchema>;

/** A change kept by name. */
export const scenarioSchema = z.object({
  id: z.string(),
  name: z.string().check(z.minLength(1), z.maxLength(60)),
  levers: leversSchema,
  createdOn: daySchema,
});
export type Scenario = z.infer<typeof scenarioSchema>;
