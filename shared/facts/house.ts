import * as z from 'zod/mini';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';

/** One group of modules that face the same way. DC rating = modules × watts (common practice, no source). */
export const arraySchema = z.object({
  id: z.string(),
  label: z.string().check(z.minLength(1), z.maxLength(80)),
  modules: z.int().check(z.minimum(1), z.maximum(500)),
  moduleWatts: z.int().check(z.minimum(50), z.maximum(1000)),
  /** Degrees from level; null when not known. */
  tiltDegrees: z.nullable(z.int().check(z.minimum(0), z.maximum(90))),
  /** Compass degrees the array faces, south 180; null when not known. */
  facingDegrees: z.nullable(z.int().check(z.minimum(0), z.maximum(359))),
});
export type ArrayFacts = z.infer<typeof arraySchema>;

export const meterSchema = z.object({
  id: z.string(),
  label: z.string(),
  channels: z.array(z.enum(['import', 'export', 'production'])),
  dials: z.int().check(z.minimum(3), z.maximum(9)),
  multiplier: decimalText,
  /** The other place this meter serves (a barn, a second house); null for the house itself. */
  servicePoint: z._default(z.nullable(z.string().check(z.minLength(1), z.maxLength(80))), null),
});
export type MeterFacts = z.infer<typeof meterSchema>;

/**
 * What the utility does with meters of other service points. `none`: each is billed by itself. `netTogether`: their kWh are added to the house's before
 * netting. `share`: surplus of the house's credit bank is sent to them.
 */
export const aggregation = z.enum(['none', 'netTogether', 'share']);
export type Aggregation = z.infer<typeof aggregation>;

export const houseSchema = z.object({
  name: z.string().check(z.minLength(1), z.maxLength(120)),
  place: z.string().check(z.maxLength(160)),
  utility: z.string().check(z.maxLength(120)),
  /** IANA time zone. */
  timeZone: z.string(),
  latitude: z.nullable(z.number().check(z.minimum(-90), z.maximum(90))),
  longitude: z.nullable(z.number().check(z.minimum(-180), z.maximum(180))),
  /** The day the utility gave permission to operate; the record begins here. Null until known. */
  switchOn: z.nullable(daySchema),
  arrays: z.array(arraySchema),
  /** Sum of the inverters' AC ratings in watts; null when not known. */
  inverterAcWatts: z.nullable(z.int().check(z.minimum(100))),
  /** The installer's estimate for each month, January first, in Wh; null when there is none. */
  expectedMonthlyWh: z.nullable(z.array(whSchema).check(z.length(12))),
  meters: z.array(meterSchema),
  aggregation: z._default(aggregation, 'none'),
});
export type HouseFacts = z.infer<typeof houseSchema>;

/** Use before the roof, by billing cycle, from old statements: energy only, never dollars. */
export const usageBeforeSchema = z.object({ from: daySchema, to: daySchema, importWh: whSchema });
export type UsageBefore = z.infer<typeof usageBeforeSchema>;

export const costKind = z.enum([
  'signing',
  'permit',
  'repair',
  'upkeep',
  'insurance',
  'propertyTax',
  'appraisal',
  'depositLost',
  'otherCost',
  'rebate',
  'stateCredit',
  'srec',
  'patronage',
  'otherIncome',
]);
export type CostKind = z.infer<typeof costKind>;

/** Kinds of the costs book that are money in; all others are money out. */
export const INCOME_KINDS: readonly CostKind[] = ['rebate', 'stateCredit', 'srec', 'patronage', 'otherIncome'];

/** One sum outside the other books, on one day or recurring. `amountCents` is positive; the kind says which way it went. */
export const costSchema = z.object({
  id: z.string(),
  on: daySchema,
  kind: costKind,
  label: z.string().check(z.minLength(1), z.maxLength(160)),
  amountCents: centsSchema,
  documentId: z.nullable(z.string()),
  /** It comes again every month, quarter or year from `on`; null for once. */
  every: z._default(z.nullable(z.enum(['month', 'quarter', 'year'])), null),
  /** The last day on which it may come again; null while it goes on. */
  until: z._default(z.nullable(daySchema), null),
});
export type CostFacts = z.infer<typeof costSchema>;
