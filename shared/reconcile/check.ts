import * as z from 'zod/mini';

export const checkId = z.enum([
  'datesChain',
  'days',
  'daysInRange',
  'registersFollow',
  'readType',
  'fileGaps',
  'importAgainstIntervals',
  'exportAgainstIntervals',
  'exportWithinProduction',
  'productionAgainstMonitor',
  'productionAtNight',
  'productionExpected',
  'linePrice',
  'bankChain',
  'nothingLost',
  'balanceChain',
  'budgetChain',
  'linesAddUp',
  'incentiveQuantity',
  'incentivePaid',
  'amountDue',
]);
export type CheckId = z.infer<typeof checkId>;

export const verdict = z.enum(['agrees', 'differs', 'nothing-to-compare']);
export type Verdict = z.infer<typeof verdict>;

/** One check of one cycle. Texts are short sentences to the owner; values are shown as given, with their unit. */
export const checkSchema = z.object({
  check: checkId,
  /** Distinguishes checks of one kind: the line's component, the meter's channel, the bank. Empty for single ones. */
  about: z.string(),
  /** `check:about`, what an accepted difference refers to. */
  key: z.string(),
  /** What is compared: "Export, statement against interval file". */
  title: z.string(),
  verdict,
  /** What the paper says and what we have, as decimal text in `unit`; null where missing. */
  stated: z.nullable(z.string()),
  found: z.nullable(z.string()),
  /** stated − found. */
  difference: z.nullable(z.string()),
  tolerance: z.nullable(z.string()),
  unit: z.enum(['kWh', 'USD', 'days', 'date', 'percent', 'text']),
  /** Likely cause, if one is known; for `nothing-to-compare`, what would settle it. */
  cause: z.nullable(z.string()),
  /** What to do next; null when nothing. */
  advice: z.nullable(z.string()),
  accepted: z.nullable(z.object({ note: z.string(), by: z.string(), on: z.string() })),
});
export type Check = z.infer<typeof checkSchema>;
