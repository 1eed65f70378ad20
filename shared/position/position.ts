import * as z from 'zod/mini';
import { cycleKey } from '../books/book.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { workingSchema } from '../working.ts';

/** Cents by book; a book without entries is zero. */
export const byBook = z.object({
  billAvoided: centsSchema,
  incentive: centsSchema,
  insurance: centsSchema,
  credit: centsSchema,
  loan: centsSchema,
  upkeep: centsSchema,
  costs: centsSchema,
});
export type ByBook = z.infer<typeof byBook>;

/** A figure with the working behind it. */
export const figureSchema = z.object({ amountCents: centsSchema, working: workingSchema });
export type Figure = z.infer<typeof figureSchema>;

/** What stands between cash so far and settled today, on a day. */
export const settledParts = z.object({
  /** Negative: what it takes to pay the loan off. */
  loanPayoff: figureSchema,
  creditStillToCome: figureSchema,
  incentiveOwed: figureSchema,
  utilityBank: figureSchema,
});
export type SettledParts = z.infer<typeof settledParts>;

/** The position at the close of a cycle (or before the first, or since the last). */
export const positionPoint = z.object({
  cycle: cycleKey,
  /** The day the point stands for: the cycle's `to`; for `before` the first cycle's `from`; for `since` today. */
  on: daySchema,
  books: byBook,
  addedCents: centsSchema,
  cashSoFarCents: centsSchema,
  loanPayoffCents: centsSchema,
  creditStillToComeCents: centsSchema,
  incentiveOwedCents: centsSchema,
  utilityBankCents: centsSchema,
  settledTodayCents: centsSchema,
  provisional: z.boolean(),
});
export type PositionPoint = z.infer<typeof positionPoint>;

/** One projected month. */
export const projectedMonth = z.object({
  /** First day of the month after the last closed cycle, and so on: the month's end. */
  on: daySchema,
  books: byBook,
  addedCents: centsSchema,
  cashSoFarCents: centsSchema,
  /** The parts of settled today beside cash so far, signed as at a close: the payoff negative. */
  loanPayoffCents: centsSchema,
  creditStillToComeCents: centsSchema,
  incentiveOwedCents: centsSchema,
  utilityBankCents: centsSchema,
  settledTodayCents: centsSchema,
  loanBalanceCents: centsSchema,
});
export type ProjectedMonth = z.infer<typeof projectedMonth>;

export const eventSchema = z.object({
  on: daySchema,
  label: z.string(),
  kind: z.enum(['credit', 'insurance', 'insuranceEnd', 'incentiveEnd', 'loanEnd', 'cost', 'planChange']),
  projected: z.boolean(),
});
export type PositionEvent = z.infer<typeof eventSchema>;

/** An assumption of the projection, with where it comes from. */
export const statedAssumption = z.object({
  name: z.string(),
  label: z.string(),
  value: z.string(),
  source: z.string(),
});

export const projectionSchema = z.object({
  months: z.array(projectedMonth),
  /** The first month from which settled today stays at or above zero; null when not within the horizon. */
  evenOn: z.nullable(daySchema),
  assumptions: z.array(statedAssumption),
});
export type Projection = z.infer<typeof projectionSchema>;

export const positionSchema = z.object({
  today: daySchema,
  points: z.array(positionPoint),
  /** Totals since the beginning, each with its working. */
  cashSoFar: figureSchema,
  settledToday: figureSchema,
  settledWithoutCredit: figureSchema,
  settledParts,
  /** Mean monthly change of settled today over the last 12 cycles; null before two cycles. */
  pace: z.nullable(figureSchema),
  /** Bill avoided + incentive + insurance − scheduled loan − upkeep of the last cycle, and its 12-cycle mean. */
  margin: z.nullable(figureSchema),
  marginMean: z.nullable(figureSchema),
  /** Sums over the last cycle, the last 12, and all, by book, each with its working (the entries). */
  sums: z.object({
    lastCycle: z.record(z.string(), figureSchema),
    last12: z.record(z.string(), figureSchema),
    all: z.record(z.string(), figureSchema),
  }),
  events: z.array(eventSchema),
  /** Why there is no projection (under one cycle, no plan), else null. */
  projection: z.nullable(projectionSchema),
  whyNoProjection: z.nullable(z.string()),
});
export type Position = z.infer<typeof positionSchema>;
