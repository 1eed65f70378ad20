import * as z from 'zod/mini';
import { figureSchema } from '../position/position.ts';
import { faultSchema } from '../problem.ts';
import { settlementSchema } from '../settlement/settlement.ts';
import { centsSchema } from '../units/cents.ts';
import { daySchema } from '../units/day.ts';
import { whSchema } from '../units/energy.ts';
import { endpoint, HOUSEHOLD } from './endpoint.ts';

const cycleDates = z.object({ from: daySchema, to: daySchema });

/** `plan` is whatever was typed or pasted: the answer says what is wrong with it. `to` chooses one of the house's own cycles; null: the last. */
export const exampleBody = z.strictObject({ plan: z.unknown(), to: z.nullable(daySchema) });

/** A cycle settled on a plan being written. Nothing of it is stored. */
export const exampleView = z.object({
  /** The energies it was settled on, and whether they are the house's own (`cycle`) or made up (`invented`). */
  usage: z.object({
    from: daySchema,
    to: daySchema,
    importWh: whSchema,
    exportWh: whSchema,
    productionWh: z.nullable(whSchema),
    source: z.enum(['cycle', 'invented']),
    /** True where periods or hours were needed and no readings say them, so that the kWh were shared evenly. */
    sharedEvenly: z.boolean(),
  }),
  /** The house's last cycles, newest first, to choose from. */
  cycles: z.array(cycleDates),
  /** Null while the plan is refused. */
  settlement: z.nullable(settlementSchema),
  /** The first prices of the plan begin after the cycle and were taken back to it. */
  pricesTakenBack: z.boolean(),
  /** What is wrong with the plan; `field` is the path within it (`charges.0.rates`). */
  faults: z.array(faultSchema),
});
export type ExampleView = z.infer<typeof exampleView>;

export const trialBody = z.strictObject({ plan: z.unknown(), cycles: z.enum(['year', 'all']) });

/** One cycle on the trial plan, beside what it came to on the present one and what was billed. All are current electric charges. */
export const trialRow = z.object({
  from: daySchema,
  to: daySchema,
  importWh: z.nullable(whSchema),
  exportWh: z.nullable(whSchema),
  billedCents: centsSchema,
  /** Null where the present plan cannot settle the cycle. */
  present: z.nullable(figureSchema),
  /** Null where the trial plan cannot; `why` says what is missing. */
  trial: z.nullable(figureSchema),
  why: z.nullable(z.string()),
  /** Paid apart from the bill on the trial plan (a payout, an incentive). */
  paidApartCents: centsSchema,
});
export type TrialRow = z.infer<typeof trialRow>;

export const trialView = z.object({
  rows: z.array(trialRow),
  /** Over the cycles that all three columns have. Null where there is none. */
  totals: z.nullable(
    z.object({
      cycles: z.int(),
      billed: figureSchema,
      present: figureSchema,
      trial: figureSchema,
      /** trial − present; negative: the trial plan costs less. */
      difference: figureSchema,
      paidApartCents: centsSchema,
    }),
  ),
  /** What the trial plan's banks hold after the last cycle, as `$31.77` cents or kWh text. */
  left: z.array(z.object({ label: z.string(), unit: z.enum(['kWh', 'USD']), amount: z.string() })),
  pricesTakenBack: z.boolean(),
  /**
   * The trial plan's riders whose price is read from bills: on how many of the cycles settled each was at the price printed for the house's own
   * rider; on the others at the trial plan's own price.
   */
  riders: z.array(z.object({ label: z.string(), asPrinted: z.int(), cycles: z.int() })),
});
export type TrialView = z.infer<typeof trialView>;

const at = '/api/households/:householdId/plan';
export const planApi = {
  example: endpoint({
    method: 'POST',
    path: `${at}/example`,
    access: HOUSEHOLD,
    body: exampleBody,
    response: exampleView,
  }),
  /** Settles the last twelve cycles, or all of them, on another plan with banks that begin empty. Refused (`plan-invalid`) with every fault. */
  trial: endpoint({ method: 'POST', path: `${at}/trial`, access: HOUSEHOLD, body: trialBody, response: trialView }),
};
