import * as z from 'zod/mini';
import { gridFactor } from '../facts/household.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { decimalText } from '../units/rate-text.ts';
import { workingSchema } from '../working.ts';
import { figureSchema } from './position.ts';

/** A figure that is no sum of money: decimal text in the working's unit. */
export const plainFigure = z.object({ value: decimalText, working: workingSchema });
export type PlainFigure = z.infer<typeof plainFigure>;

/** The handbook figures of one way of paying; null where the flows give none. */
export const handbookColumn = z.object({
  simplePayback: z.nullable(plainFigure),
  discountedPayback: z.nullable(plainFigure),
  rateOfReturn: z.nullable(plainFigure),
  netPresentValue: figureSchema,
  costPerKwh: z.nullable(plainFigure),
});
export type HandbookColumn = z.infer<typeof handbookColumn>;

export const handbookSchema = z.object({
  discountRate: decimalText,
  /** Years of flows after the start, the last perhaps not whole. */
  years: z.int(),
  /** Cycles whose production is not known and is estimated here at the record's mean. */
  estimatedCycles: z.int(),
  asBought: handbookColumn,
  /** The roof as if it had been bought with cash; null where there is no loan. */
  asCash: z.nullable(handbookColumn),
});
export type Handbook = z.infer<typeof handbookSchema>;

/** What eight of ten resampled futures lie between, month by month as the projection's months stand, and when they come even. */
export const rangeSchema = z.object({
  resamples: z.int(),
  months: z.array(z.object({ lowCents: centsSchema, highCents: centsSchema })),
  /** The tenth and the ninetieth of a hundred, by the day they come even for good; null where that one does not within the horizon. */
  evenEarliest: z.nullable(daySchema),
  evenLatest: z.nullable(daySchema),
  /** How many of the resamples come even within the horizon. */
  evenWithin: z.int(),
});
export type Range = z.infer<typeof rangeSchema>;

/** CO₂ the grid did not emit, in whole kilograms: to date, and over the months projected; null where no production is known. */
export const carbonSchema = z.object({
  factor: gridFactor,
  toDate: z.nullable(plainFigure),
  projected: z.nullable(plainFigure),
  /** Cycles whose production is not known: they avoid nothing here. */
  missingCycles: z.int(),
});
export type Carbon = z.infer<typeof carbonSchema>;
