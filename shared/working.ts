import * as z from 'zod/mini';

/** How a figure is known. An `estimated` one is always called so on the screen. */
export const figureBasis = z.enum(['billed', 'metered', 'computed', 'estimated', 'entered']);
export type FigureBasis = z.infer<typeof figureBasis>;

/** Where an input comes from: a paper, a reading, what somebody typed, a rule, or another figure. */
export const sourceSchema = z.discriminatedUnion('kind', [
  /** A row or place in an uploaded file. */
  z.object({ kind: z.literal('document'), documentId: z.string(), fileName: z.string(), place: z.string() }),
  /** Typed by a person on a day. */
  z.object({ kind: z.literal('typed'), by: z.string(), on: z.string() }),
  /** A rule and the version of it, such as a rate plan's row or a section of law. */
  z.object({ kind: z.literal('rule'), name: z.string(), version: z.string() }),
  /** Another figure of this ledger, by name. */
  z.object({ kind: z.literal('figure'), name: z.string() }),
]);
export type Source = z.infer<typeof sourceSchema>;

export const workingInput = z.object({
  /** The name the formula uses: a letter followed by letters and digits. */
  name: z.string(),
  /** What it is, in words. */
  label: z.string(),
  /** Exact decimal text; a list for `sum`, `min`, `max`. Money in USD ("20.14"), energy in kWh ("498"). */
  value: z.union([z.string(), z.array(z.string())]),
  /** USD, kWh, days, USD/kWh, fraction, months … */
  unit: z.string(),
  source: sourceSchema,
});
export type WorkingInput = z.infer<typeof workingInput>;

/**
 * The working behind a figure. `formula` is written in the small language of `shared/working-formula.ts`
 * (`roundCents(import * rate)`) over the inputs' names and can be evaluated; `words` says the same to a person.
 */
export const workingSchema = z.object({
  words: z.string(),
  formula: z.string(),
  inputs: z.array(workingInput),
  /** Unit of the result: USD or kWh, days, fraction. */
  unit: z.string(),
  basis: figureBasis,
});
export type Working = z.infer<typeof workingSchema>;
