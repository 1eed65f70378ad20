import * as z from 'zod/mini';
import { entrySchema } from '../books/book.ts';
import { readChannel, statementSchema } from '../facts/papers.ts';
import { checkSchema } from '../reconcile/check.ts';
import { settlementSchema } from '../settlement/settlement.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { decimalText } from '../units/rate-text.ts';
import { workingSchema } from '../working.ts';

/** An energy of a cycle and how it is known. */
export const energyFigure = z.object({
  wh: whSchema,
  /** `register` and `printed` come from the statement, `intervals` from uploaded data, `monitor` from the inverter, `computed` from others. */
  from: z.enum(['register', 'printed', 'intervals', 'monitor', 'computed']),
  /** Share of the cycle's days that the data cover, 0–1; 1 for registers. */
  coverage: z.number(),
  working: workingSchema,
});
export type EnergyFigure = z.infer<typeof energyFigure>;

/** What the energy of a cycle was. A missing figure is null, never zero. */
export const cycleEnergy = z.object({
  import: z.nullable(energyFigure),
  export: z.nullable(energyFigure),
  production: z.nullable(energyFigure),
  /** production − export */
  selfUse: z.nullable(energyFigure),
  /** import + self-use */
  use: z.nullable(energyFigure),
});
export type CycleEnergy = z.infer<typeof cycleEnergy>;

/** Credit that left a bank for other service points in a cycle, as the statement states it. */
export const sentOutSchema = z.object({
  bank: z.string(),
  unit: z.enum(['kWh', 'USD']),
  amount: decimalText,
  /** What it took off the other bills, as printed there; null when not stated. */
  valueCents: z.nullable(centsSchema),
});
export type SentOut = z.infer<typeof sentOutSchema>;

/** What one meter of several saw of a channel. `counted` is false for a meter of another service point that is billed by itself. */
export const meterEnergy = z.object({
  meter: z.string(),
  /** The name the house gives it; null where it is not among its meters. */
  label: z.nullable(z.string()),
  channel: readChannel,
  servicePoint: z.nullable(z.string()),
  counted: z.boolean(),
  figure: energyFigure,
});
export type MeterEnergy = z.infer<typeof meterEnergy>;

/** `open`: something is missing. `balanced`: every check agrees. `differs`: one differs. `accepted`: all that differ are accepted. */
export const cycleState = z.enum(['open', 'balanced', 'differs', 'accepted']);
export type CycleState = z.infer<typeof cycleState>;

export const withoutRoofMethod = z.enum(['measured', 'sameMonthBefore', 'yearlyMeanBefore']);
export type WithoutRoofMethod = z.infer<typeof withoutRoofMethod>;

/** One line of the facing pages: billed on the left, ours on the right. Either side may be missing. */
export const facingLine = z.object({
  key: z.string(),
  label: z.string(),
  unit: z.nullable(z.string()),
  billed: z.nullable(
    z.object({
      quantity: z.nullable(z.string()),
      rate: z.nullable(z.string()),
      amountCents: centsSchema,
      inDue: z.boolean(),
    }),
  ),
  ours: z.nullable(
    z.object({
      quantity: z.nullable(z.string()),
      rate: z.nullable(z.string()),
      amountCents: centsSchema,
      inDue: z.boolean(),
      working: workingSchema,
    }),
  ),
  /** billed − ours in cents; null when one side is missing. */
  differenceCents: z.nullable(centsSchema),
  verdict: z.enum(['agrees', 'differs', 'nothing-to-compare']),
});
export type FacingLine = z.infer<typeof facingLine>;

/** A cycle as the ledger assembles it. */
export const cycleSchema = z.object({
  index: z.int(),
  from: daySchema,
  to: daySchema,
  days: z.int(),
  state: cycleState,
  /** True while an estimated read awaits the next actual one. */
  provisional: z.boolean(),
  /** The first statement, split at the switch-on day by days: figures are estimates. */
  split: z.boolean(),
  statement: statementSchema,
  energy: cycleEnergy,
  /** Meter by meter, where a channel has more than one. */
  meters: z.array(meterEnergy),
  /** Credit sent to other service points, by which `settlement.banks` close lower than their moves alone say. */
  sentOut: z.array(sentOutSchema),
  /** What the bill should have been on the metered energy, from the bank as the ledger carries it. Null when not computable; `why` says so. */
  settlement: z.nullable(settlementSchema),
  whyNotSettled: z.nullable(z.string()),
  /** The day the plan version in force began, for "rate plan from 1 Jun"; null without a plan. */
  planFrom: z.nullable(daySchema),
  facing: z.array(facingLine),
  billedDueCents: centsSchema,
  oursDueCents: z.nullable(centsSchema),
  /** Bill for the same use without the roof; null when nothing allows it. */
  withoutRoof: z.nullable(
    z.object({
      amountCents: centsSchema,
      method: withoutRoofMethod,
      useWh: whSchema,
      settlement: settlementSchema,
      working: workingSchema,
    }),
  ),
  /** Current electric charges after bank credits, without previous balance, payments, deposits and other services. */
  asItWas: z.object({ amountCents: centsSchema, working: workingSchema }),
  checks: z.array(checkSchema),
  /** Mistakes that, made alone, give exactly what was billed; found by settling again. Empty where none does or nothing differs. */
  causes: z.array(z.object({ cause: z.string(), words: z.string() })),
  /** All entries that fall in this cycle. */
  entries: z.array(entrySchema),
  /** Sum of this cycle's entries (cash and avoided). */
  addedCents: centsSchema,
  /** Loan payments that fall in this cycle: usually 1; 0 or 2 is said. */
  loanPayments: z.int(),
});
export type Cycle = z.infer<typeof cycleSchema>;
