import * as z from 'zod/mini';

/** One thing that asks for the owner. `tone` bad: something is wrong; note: something is next. */
export const needSchema = z.object({
  key: z.string(),
  tone: z.enum(['bad', 'note']),
  title: z.string(),
  detail: z.string(),
  /** In-app path to where it is dealt with, relative to the household (`cycles/2026-09-14`, `log`). */
  link: z.nullable(z.string()),
});
export type Need = z.infer<typeof needSchema>;
