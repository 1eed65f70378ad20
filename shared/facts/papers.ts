import * as z from 'zod/mini';
import { lineKind, lineUnit } from '../settlement/settlement.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';

export const documentSchema = z.object({
  id: z.string(),
  fileName: z.string(),
  kind: z.enum(['statement', 'production', 'credit', 'other']),
  /** Lower-case hex SHA-256 of the bytes as they came. */
  sha256: z.string(),
  size: z.int(),
  uploadedOn: daySchema,
  uploadedBy: z.string(),
});
export type DocumentFacts = z.infer<typeof documentSchema>;

/** Where a statement's values stand in its file (row counts from 1, header included), or who typed them. */
export const paperSource = z.union([
  z.object({
    kind: z.literal('file'),
    documentId: z.string(),
    fileName: z.string(),
    firstRow: z.int(),
    lastRow: z.int(),
  }),
  z.object({ kind: z.literal('typed'), by: z.string(), on: daySchema }),
]);
export type PaperSource = z.infer<typeof paperSource>;

export const readChannel = z.enum(['import', 'export', 'production']);
export type ReadChannel = z.infer<typeof readChannel>;

/** A register read as printed. A meter exchange is two reads of one channel whose dates meet. */
export const registerRead = z.object({
  meter: z.string(),
  channel: readChannel,
  from: daySchema,
  to: daySchema,
  previous: decimalText,
  current: decimalText,
  dials: z.int().check(z.minimum(3), z.maximum(9)),
  multiplier: decimalText,
  type: z.enum(['actual', 'estimated']),
  /** The row of the file it was read from; null when typed. */
  row: z.nullable(z.int()),
});
export type RegisterRead = z.infer<typeof registerRead>;

/** A line as printed. `component` is the plan's charge, credit or bank id it was matched to; null when it matches none. */
export const printedLine = z.object({
  component: z.nullable(z.string()),
  kind: z.union([lineKind, z.literal('otherService')]),
  label: z.string().check(z.minLength(1), z.maxLength(160)),
  quantity: z.nullable(decimalText),
  unit: z.nullable(lineUnit),
  rate: z.nullable(decimalText),
  amountCents: centsSchema,
  /** False for what is printed but not part of the amount due (a credit put into the bank). */
  inDue: z.boolean(),
  row: z.nullable(z.int()),
});
export type PrintedLine = z.infer<typeof printedLine>;

export const printedBank = z.object({
  bank: z.string(),
  unit: z.enum(['kWh', 'USD']),
  open: z.nullable(decimalText),
  close: z.nullable(decimalText),
  /** What went from this bank to other service points in the cycle, in its unit; null when nothing is printed of it. */
  sentOut: z._default(z.nullable(decimalText), null),
  /** What it took off the other service points' bills, as printed there; null when the owner has not said. */
  sentValueCents: z._default(z.nullable(centsSchema), null),
  row: z.nullable(z.int()),
});
export type PrintedBank = z.infer<typeof printedBank>;

/**
 * Budget (levelized) billing: the utility asks for a fixed sum and keeps the difference to the real charges in a balance. The statement's lines
 * stay the real charges; the amount due holds the instalment in place of those for electricity.
 */
export const printedBudget = z.object({
  instalmentCents: centsSchema,
  /** The running deferred balance as printed; positive: the house owes it. */
  balanceCents: z.nullable(centsSchema),
  /** The yearly settlement of that balance where this bill holds it; positive: charged. */
  settledCents: z.nullable(centsSchema),
});
export type PrintedBudget = z.infer<typeof printedBudget>;

/** The amount due of a bill on a budget plan does not say what the electricity cost: only its lines do. */
export const budgetNeedsLines = z.refine<{ budget: PrintedBudget | null; lines: PrintedLine[] }>(
  ({ budget, lines }) => budget === null || lines.some((line) => line.kind !== 'otherService'),
  { error: 'With a budget amount, add the real charges as lines: the amount due does not say them.', path: ['lines'] },
);

const statementFields = z.object({
  id: z.string(),
  /** 1 for the first; the highest revision is the one in force. */
  revision: z.int().check(z.minimum(1)),
  from: daySchema,
  to: daySchema,
  printedDays: z.nullable(z.int()),
  statementOn: z.nullable(daySchema),
  dueOn: z.nullable(daySchema),
  reads: z.array(registerRead),
  /** kWh as printed beside the registers; null when not printed. */
  importWh: z.nullable(whSchema),
  exportWh: z.nullable(whSchema),
  productionWh: z.nullable(whSchema),
  lines: z.array(printedLine),
  banks: z.array(printedBank),
  previousBalanceCents: z.nullable(centsSchema),
  paymentsCents: z.nullable(centsSchema),
  amountDueCents: centsSchema,
  /** Null where the bill is not on a budget plan. */
  budget: z._default(z.nullable(printedBudget), null),
  source: paperSource,
  /** Why this revision was made; null for the first. */
  reason: z.nullable(z.string()),
  enteredBy: z.string(),
  enteredAt: z.string(),
});

/** A statement, as printed. A correction is a new revision of the same statement; the old one stays. */
export const statementSchema = statementFields.check(budgetNeedsLines);
export type Statement = z.infer<typeof statementSchema>;

/** `production`: the utility's or programme's production meter. `monitor`: the inverter's own monitoring. */
export const intervalChannel = z.enum(['production', 'monitor', 'import', 'export']);
export type IntervalChannel = z.infer<typeof intervalChannel>;

/**
 * One channel and local day of interval data. `values` holds the day's steps in time order in Wh, null where a reading is missing; a day of 23 or
 * 25 hours has that many hours of steps. `minutes` is 5, 15, 30, 60, or 1440 for one figure a day.
 */
export const intervalDay = z.object({
  channel: intervalChannel,
  day: daySchema,
  minutes: z.int().check(z.minimum(1), z.maximum(1440)),
  values: z.array(z.nullable(z.int())),
  documentId: z.nullable(z.string()),
});
export type IntervalDay = z.infer<typeof intervalDay>;

/** A difference the owner has looked at and lets stand. */
export const acceptedDifference = z.object({
  cycleTo: daySchema,
  check: z.string(),
  note: z.string().check(z.minLength(1), z.maxLength(1000)),
  by: z.string(),
  on: daySchema,
});
export type AcceptedDifference = z.infer<typeof acceptedDifference>;
