import * as z from 'zod/mini';
import { type Cents, centsSchema } from '../units/cents.ts';
import { type Day, daySchema } from '../units/day.ts';
import type { Wh } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';
import { workingSchema } from '../working.ts';

export const lineKind = z.enum([
  'import',
  'export',
  'credit',
  'incentive',
  'fixed',
  'nonbypassable',
  'demand',
  'tax',
  'minimum',
  'trueup',
  'adjustment',
  'previousBalance',
  'payment',
]);
export type LineKind = z.infer<typeof lineKind>;

export const lineUnit = z.enum(['kWh', 'cycle', 'day', 'kW', 'USD']);
export type LineUnit = z.infer<typeof lineUnit>;

/** A line of a settled cycle: charges positive, credits negative. `rate` is USD per unit, or a fraction for unit USD. */
export const settledLine = z.object({
  component: z.string(),
  kind: lineKind,
  label: z.string(),
  period: z.nullable(z.string()),
  tier: z.nullable(z.int()),
  from: z.nullable(daySchema),
  to: z.nullable(daySchema),
  quantity: z.nullable(z.string()),
  unit: z.nullable(lineUnit),
  rate: z.nullable(z.string()),
  amountCents: centsSchema,
  inDue: z.boolean(),
  working: workingSchema,
});
export type SettledLine = z.infer<typeof settledLine>;

/** Money paid apart from the bill (an incentive cheque, a true-up payment); positive to the customer. */
export const payoutSchema = z.object({
  component: z.string(),
  kind: lineKind,
  label: z.string(),
  quantity: z.nullable(z.string()),
  unit: z.nullable(lineUnit),
  rate: z.nullable(z.string()),
  amountCents: centsSchema,
  working: workingSchema,
});
export type Payout = z.infer<typeof payoutSchema>;

/** What a bank did in a cycle, in its unit (kWh or USD) as decimal text; close = open + earned − used − expired − paid. */
export const bankMove = z.object({
  open: z.string(),
  earned: z.string(),
  used: z.string(),
  expired: z.string(),
  paid: z.string(),
  close: z.string(),
});
export type BankMove = z.infer<typeof bankMove>;

export const lotSchema = z.object({ earned: daySchema, amount: z.string(), cyclesLeft: z.int() });
export type Lot = z.infer<typeof lotSchema>;

/** A bank's state over a cycle: one move, or one per time-of-use period under `byPeriod`. */
export const settledBank = z.object({
  bank: z.string(),
  label: z.string(),
  unit: z.enum(['kWh', 'USD']),
  period: z.nullable(z.string()),
  move: bankMove,
  lots: z.nullable(z.array(lotSchema)),
});
export type SettledBank = z.infer<typeof settledBank>;

export const settlementSchema = z.object({
  from: daySchema,
  to: daySchema,
  days: z.int(),
  lines: z.array(settledLine),
  banks: z.array(settledBank),
  payouts: z.array(payoutSchema),
  amountDueCents: centsSchema,
});
export type Settlement = z.infer<typeof settlementSchema>;

/** A balance brought into a cycle: plain, by period, in lots (oldest first), or in lots by period. */
export const openingBalance = z.union([
  decimalText,
  z.record(z.string(), decimalText),
  z.object({ lots: z.array(lotSchema) }),
  z.record(z.string(), z.object({ lots: z.array(lotSchema) })),
]);
export type OpeningBalance = z.infer<typeof openingBalance>;

/** What the books of the utility hold before a cycle. `balanceCents` is null where the account's balance is not followed. */
export const openingSchema = z.object({
  banks: z.record(z.string(), openingBalance),
  usageSinceTrueUp: z.record(z.string(), z.object({ cycles: z.int(), kWh: decimalText })),
  capUsed: z.record(z.string(), z.record(z.string(), decimalText)),
  balanceCents: z.nullable(centsSchema),
});
export type Opening = z.infer<typeof openingSchema>;

export const EMPTY_OPENING: Opening = { banks: {}, usageSinceTrueUp: {}, capUsed: {}, balanceCents: null };

export type Flow = { importWh: Wh; exportWh: Wh };

/**
 * What a cycle needs to be settled. Energies in Wh; what the plan does not ask for may be null or empty. A plan that asks for
 * something that is null is refused (`SettlementRefused`).
 */
export type CycleUsage = {
  from: Day;
  to: Day;
  importWh: Wh;
  exportWh: Wh;
  productionWh: Wh | null;
  loadWh: Wh | null;
  byPeriod: Record<string, Flow> | null;
  netted: Partial<Record<'15min' | 'hour', Flow & { byPeriod: Record<string, Flow> | null }>>;
  /** Production and use by period, where they are stated; interval data, where there are any, tell them by themselves. */
  ownByPeriod?: Record<string, { productionWh: Wh; loadWh: Wh }>;
  kW: Partial<Record<'dc' | 'ac' | 'demand', string>>;
  payments: { on: Day; amountCents: Cents }[];
  finalBill: boolean;
  /** Interval data, where the plan asks for them: values in Wh from `startUtc` (ISO instant), equal steps. */
  intervals: {
    startUtc: string;
    minutes: number;
    importWh: number[];
    exportWh: number[];
    productionWh: number[];
  } | null;
};
