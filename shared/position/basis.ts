import * as z from 'zod/mini';
import { bookId } from '../books/book.ts';
import { householdFacts } from '../facts/household.ts';
import { energySplit } from '../metering/energy-split.ts';
import { hourlyProfile } from '../metering/hourly-profile.ts';
import { openingSchema } from '../settlement/settlement.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';

/** The facts a projection needs; papers, readings and names stay behind. */
export const basisFacts = z.object({
  house: z.pick(householdFacts.shape.house, { arrays: true, inverterAcWatts: true, expectedMonthlyWh: true }),
  plans: householdFacts.shape.plans,
  loan: householdFacts.shape.loan,
  otherLoans: householdFacts.shape.otherLoans,
  lease: householdFacts.shape.lease,
  mortgage: householdFacts.shape.mortgage,
  credit: householdFacts.shape.credit,
  incentive: householdFacts.shape.incentive,
  costs: householdFacts.shape.costs,
  usageBefore: householdFacts.shape.usageBefore,
  assumptions: householdFacts.shape.assumptions,
});
export type BasisFacts = z.infer<typeof basisFacts>;

/** What is known of a closed cycle's energy; null where it is not measured. */
export const energyCycle = z.object({
  from: daySchema,
  to: daySchema,
  importWh: z.nullable(whSchema),
  exportWh: z.nullable(whSchema),
  productionWh: z.nullable(whSchema),
  /** Stands on an estimated read: it is projected from, and no range is drawn from it. */
  provisional: z.boolean(),
  /** How it fell on the periods of the plan it was billed by; null where it was not measured or the plan does not ask. */
  split: z._default(z.nullable(energySplit), null),
});
export type EnergyCycle = z.infer<typeof energyCycle>;

/** Money on a day: positive is kept or received. */
export const flowSchema = z.object({ on: daySchema, book: bookId, amountCents: centsSchema });
export type Flow = z.infer<typeof flowSchema>;

/**
 * Everything a projection starts from, as plain data of a few kilobytes: it can be sent to the browser, changed there and projected again. Money in
 * cents, energy in Wh.
 */
export const projectionBasis = z.object({
  today: daySchema,
  facts: basisFacts,
  /** Closed cycles in order. */
  cycles: z.array(energyCycle),
  /** The shape of a mean day of each month, for periods the cycles are not split by; null without readings by the hour. */
  hourly: z._default(z.nullable(hourlyProfile), null),
  /** What the utility's books hold after the last cycle. */
  opening: openingSchema,
  /** The position at the close of the last cycle. */
  close: z.object({
    on: daySchema,
    cashSoFarCents: centsSchema,
    incentiveOwedCents: centsSchema,
    creditReceivedCents: centsSchema,
  }),
  /** Since when settled today has stood at or above zero at every close that is not provisional, to the last; null where it does not. */
  evenSince: z.nullable(daySchema),
  /** What was posted since the last cycle, save what follows from the loan's and the mortgage's schedules. */
  since: z.array(flowSchema),
});
export type ProjectionBasis = z.infer<typeof projectionBasis>;
