import * as z from 'zod/mini';
import { daySchema } from '../units/day.ts';
import { decimalText } from '../units/rate-text.ts';

/**
 * What a rate plan can say. One JSON value; parameters that combine, not one program per form.
 * Rates, percents, kWh and money are decimal text; days, months, cycles and tiers are integers; dates are civil dates.
 * Defaults are filled in on parsing, so that a parsed plan has every field.
 */
const id = z.string().check(
  z.regex(/^[a-z][A-Za-z0-9]*$/, { error: 'An id is camelCase: letters and digits.' }),
  z.refine((value) => !['bill', 'separate', 'account'].includes(value), { error: 'This id is reserved.' }),
);
const label = z.string().check(z.minLength(1), z.maxLength(120));
const yearlyDay = z.string().check(z.regex(/^(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/));
const clock = z.string().check(z.regex(/^([01]\d|2[0-3]):[0-5]\d$|^24:00$/));

/** Counts are numbers; a plan may write one as text, as it writes its other figures. */
const wholeNumber = z.union([
  z.int().check(z.minimum(0)),
  z.pipe(
    z.string().check(z.regex(/^\d{1,4}$/)),
    z.transform((text) => Number(text)),
  ),
]);

export const nettingSchema = z.enum(['none', '15min', 'hour', 'period', 'cycle']);
export type Netting = z.infer<typeof nettingSchema>;

export const changeBySchema = z.enum(['days', 'readDate', 'intervals']);
export type ChangeBy = z.infer<typeof changeBySchema>;

export const rateRow = z.object({
  from: daySchema,
  season: z.optional(z.string()),
  period: z.optional(z.string()),
  tier: z.optional(z.int().check(z.minimum(1))),
  rate: decimalText,
});
export type RateRow = z.infer<typeof rateRow>;

export const tierRow = z.object({
  from: daySchema,
  season: z.optional(z.string()),
  per: z.enum(['cycle', 'day']),
  limits: z.array(decimalText),
});
export type TierRow = z.infer<typeof tierRow>;

export const ratesOfSchema = z.object({
  charges: z.array(z.string()),
  fraction: z._default(decimalText, '1'),
  tier: z._default(z.int().check(z.minimum(1)), 1),
});
export type RatesOf = z.infer<typeof ratesOfSchema>;

export const seasonSchema = z.object({ id, from: yearlyDay, to: yearlyDay });
export type Season = z.infer<typeof seasonSchema>;

export const periodWhen = z.object({
  season: z.optional(z.string()),
  days: z.enum(['weekday', 'weekend', 'all']),
  from: clock,
  to: clock,
});
export const periodSchema = z.object({
  id,
  label: z._default(z.string(), ''),
  when: z.union([z.array(periodWhen), z.literal('rest')]),
});
export type Period = z.infer<typeof periodSchema>;

export const calendarSchema = z.object({
  seasons: z._default(z.array(seasonSchema), []),
  periods: z._default(z.array(periodSchema), []),
  holidays: z._default(z.nullable(z.object({ dates: z.array(daySchema), as: z.enum(['weekend', 'weekday']) })), null),
});
export type PlanCalendar = z.infer<typeof calendarSchema>;

export const chargeKind = z.enum(['import', 'fixed', 'nonbypassable', 'demand', 'tax', 'minimum', 'adjustment']);
export const chargeBasis = z.enum(['import', 'export', 'production', 'load', 'cycle', 'day', 'kW', 'percent', 'floor']);
export const chargeSchema = z.object({
  id,
  label,
  kind: chargeKind,
  basis: chargeBasis,
  rates: z.array(rateRow),
  tiers: z._default(z.array(tierRow), []),
  netting: z._default(z.nullable(nettingSchema), null),
  kWOf: z._default(z.nullable(z.enum(['dc', 'ac', 'demand'])), null),
  on: z._default(z.array(z.string()), []),
  per: z._default(z.nullable(z.enum(['cycle', 'day'])), null),
  afterCredits: z._default(z.boolean(), false),
  /** Our addition: charged only because of the roof, so dropped from the bill without it (default: kept). */
  solarOnly: z._default(z.boolean(), false),
  /**
   * Our addition: a rider whose price changes with every bill (fuel, purchased power) and is read from it (ledger.md §3): its arithmetic is checked,
   * its rate is not. The rows hold until the first bill that prints it; the last one read holds after it.
   */
  learned: z._default(z.boolean(), false),
});
export type Charge = z.infer<typeof chargeSchema>;

export const creditSchema = z.object({
  id,
  label,
  kind: z.enum(['export', 'incentive']),
  basis: z.enum(['export', 'production']),
  netting: z._default(z.nullable(nettingSchema), null),
  rates: z._default(z.nullable(z.array(rateRow)), null),
  ratesOf: z._default(z.nullable(ratesOfSchema), null),
  term: z._default(z.nullable(z.object({ firstDay: daySchema, lastDay: daySchema })), null),
  cap: z._default(z.nullable(z.object({ amount: decimalText, per: z.enum(['year', 'term']) })), null),
  to: z.string(),
});
export type Credit = z.infer<typeof creditSchema>;

export const trueUpSchema = z.object({
  at: z.union([
    z.object({ months: z.array(z.int().check(z.minimum(1), z.maximum(12))) }),
    z.object({ date: yearlyDay }),
    z.literal('everyCycle'),
    z.literal('finalBill'),
  ]),
  keep: z._default(
    z.nullable(
      z.union([
        z.object({ amount: decimalText }),
        z.object({ averageCycles: wholeNumber, usage: z.enum(['import', 'load', 'net']) }),
      ]),
    ),
    null,
  ),
  atLeast: z._default(decimalText, '0'),
  action: z.enum(['expire', 'donate', 'pay']),
  rates: z._default(z.nullable(z.array(rateRow)), null),
  ratesOf: z._default(z.nullable(ratesOfSchema), null),
  to: z._default(z.nullable(z.enum(['bill', 'separate'])), null),
  fee: z._default(decimalText, '0'),
});
export type TrueUp = z.infer<typeof trueUpSchema>;

export const bankSchema = z.object({
  id,
  label,
  unit: z.enum(['kWh', 'USD']),
  netting: z._default(z.nullable(nettingSchema), null),
  byPeriod: z._default(z.boolean(), false),
  ifPeriodAbsent: z._default(z.enum(['hold', 'otherPeriods']), 'hold'),
  ratio: z._default(decimalText, '1'),
  sameCycle: z._default(z.boolean(), false),
  offsets: z._default(z.array(z.string()), []),
  keepMinimum: z._default(z.nullable(z.string()), null),
  belowZero: z._default(z.boolean(), false),
  lotLife: z._default(z.nullable(z.object({ cycles: z.int().check(z.minimum(1)) })), null),
  trueUps: z._default(z.array(trueUpSchema), []),
});
export type PlanBank = z.infer<typeof bankSchema>;

export const ratePlanSchema = z.object({
  name: z._default(z.string().check(z.maxLength(120)), ''),
  timeZone: z.string(),
  netting: nettingSchema,
  load: z._default(z.enum(['none', 'computed', 'metered']), 'none'),
  rateChangeBy: z._default(changeBySchema, 'days'),
  seasonBy: z._default(changeBySchema, 'readDate'),
  calendar: z._default(calendarSchema, { seasons: [], periods: [], holidays: null }),
  charges: z.array(chargeSchema),
  credits: z._default(z.array(creditSchema), []),
  banks: z._default(z.array(bankSchema), []),
  rounding: z._default(
    z.object({
      money: z._default(z.enum(['halfUp', 'halfEven']), 'halfUp'),
      limits: z._default(z.enum(['whole', 'exact']), 'whole'),
      kWh: z._default(z.enum(['exact', 'whole']), 'exact'),
    }),
    { money: 'halfUp', limits: 'whole', kWh: 'exact' },
  ),
});
export type RatePlan = z.infer<typeof ratePlanSchema>;
/** A plan as a person or a file writes it: fields with a default may be left out. */
export type RatePlanInput = z.input<typeof ratePlanSchema>;
