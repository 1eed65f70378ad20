import * as z from 'zod/mini';
import type { Aggregation, MeterFacts } from '#shared/facts/house.ts';
import { decimal } from '#src/lib/format.ts';
import { plainDecimal, typed, typedWhole } from '#src/lib/typed-values.ts';

/** Which registers a meter has, as people say it. */
export const METER_KINDS = {
  net: { words: 'Net meter: bought and sent out', channels: ['import', 'export'] },
  import: { words: 'Bought only', channels: ['import'] },
  export: { words: 'Sent out only', channels: ['export'] },
  production: { words: 'Production meter', channels: ['production'] },
  all: { words: 'All three', channels: ['import', 'export', 'production'] },
} as const satisfies Record<string, { words: string; channels: readonly MeterFacts['channels'][number][] }>;
export type MeterKind = keyof typeof METER_KINDS;
export const KINDS = Object.keys(METER_KINDS) as MeterKind[];

/** What the utility does with a meter of another service point, as people say it. */
export const AGGREGATION_WORDS = {
  none: 'bills it by itself',
  netTogether: 'adds its kWh to the house’s before netting',
  share: 'sends it a share of the house’s surplus',
} as const satisfies Record<Aggregation, string>;
export const AGGREGATIONS = Object.keys(AGGREGATION_WORDS) as Aggregation[];

export const roofForm = z
  .object({
    arrays: z.array(
      z.object({
        key: z.string(),
        label: z.string().check(z.trim(), z.minLength(1, { error: 'Name the array, such as South.' }), z.maxLength(80)),
        modules: typedWhole(1, 500),
        watts: typedWhole(50, 1000),
        tilt: typedWhole(0, 90, true),
        facing: typedWhole(0, 359, true),
      }),
    ),
    acKw: z.string().check(
      z.refine((text) => text.trim() === '' || (wattsOf(text) ?? 0) >= 100, {
        error: 'Write kilowatts such as 10, or leave it empty.',
      }),
    ),
    months: z.array(z.object({ kwh: typed.kwhOrNone })),
    meters: z.array(
      z.object({
        number: z.string().check(z.trim(), z.minLength(1, { error: 'Write the meter’s number.' })),
        label: z.string().check(z.maxLength(80)),
        kind: z.enum(KINDS),
        dials: typedWhole(3, 9),
        multiplier: typed.rate,
        servicePoint: z.string().check(z.maxLength(80)),
      }),
    ),
    aggregation: z.enum(AGGREGATIONS),
  })
  .check(
    z.refine((form) => [0, 12].includes(form.months.filter((month) => month.kwh.trim() !== '').length), {
      error: 'Fill in all twelve months of the estimate, or none.',
      path: ['months', 0, 'kwh'],
    }),
  );

/** Kilowatts as typed in whole watts, by moving the point; null when finer than a watt or no number. */
export function wattsOf(text: string): number | null {
  const plain = plainDecimal(text);
  const match = plain === null ? null : /^(\d{1,6})(?:\.(\d{1,3})0*)?$/.exec(plain);
  return match ? Number(match[1]) * 1000 + Number((match[2] ?? '').padEnd(3, '0')) : null;
}

export function kilowatts(watts: number): string {
  const whole = Math.floor(watts / 1000);
  const rest = String(watts % 1000).padStart(3, '0');
  return decimal(`${whole}.${rest.endsWith('0') ? rest.slice(0, 2) : rest}`);
}

export function kindOf(meter: MeterFacts): MeterKind {
  const has = (kind: MeterKind) =>
    METER_KINDS[kind].channels.length === meter.channels.length &&
    METER_KINDS[kind].channels.every((channel) => meter.channels.includes(channel));
  return KINDS.find(has) ?? 'net';
}

export type RoofForm = z.infer<typeof roofForm>;
