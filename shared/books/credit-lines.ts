import * as z from 'zod/mini';
import { centsSchema } from '../units/cents.ts';

/** Form 5695 Part I, solar electric only, for one tax year; amounts in cents though the form takes whole dollars. */
export const creditLines = z.object({
  taxYear: z.int(),
  line1Cents: centsSchema,
  line6aCents: centsSchema,
  /** The rate of the year placed in service, fraction text; null where no cost enters this year. */
  rate: z.nullable(z.string()),
  line6bCents: centsSchema,
  /** Null where an earlier year's limit is missing: what is carried in is then not known, and neither are 13, 15 and 16. */
  line12Cents: z.nullable(centsSchema),
  line13Cents: z.nullable(centsSchema),
  /** Null until typed: then lines 15 and 16 cannot be worked out. */
  line14Cents: z.nullable(centsSchema),
  line15Cents: z.nullable(centsSchema),
  line16Cents: z.nullable(centsSchema),
});
export type CreditLines = z.infer<typeof creditLines>;
