import fc from 'fast-check';
import { type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import type { IntervalChannel, IntervalDay, PrintedLine, RegisterRead, Statement } from '#shared/facts/papers.ts';
import type { RatePlan } from '#shared/settlement/plan.ts';
import { type SettledAmounts, settleAmounts } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { addDays, type Day, day, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { Exact } from '#shared/units/rate.ts';
import { buildHousehold } from '#tests/support/build-household.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';

/** What the meters of a cycle saw, in whole kWh as their registers show them. */
export type Metered = { days: number; importKwh: number; exportKwh: number; ownKwh: number };

/** A house on a plan: its cycles as they are settled, and as they were settled. */
export type SettledHouse = { plan: RatePlan; usages: CycleUsage[]; settled: SettledAmounts[] };

export const metered: fc.Arbitrary<Metered[]> = fc.array(
  fc.record({
    days: fc.integer({ min: 27, max: 33 }),
    importKwh: fc.nat(900),
    exportKwh: fc.nat(900),
    ownKwh: fc.nat(500),
  }),
  { minLength: 2, maxLength: 3 },
);

/** No clock changes from here on to the last cycle's end. */
const FIRST = day('2026-04-14');
const STEPS = 96;
/** Ten to six: the sun is up, and the evening's period has begun. */
const MIDDAY = { from: 40, to: 72 };

/** Settles what the meters saw on a plan, in turn. `seed` says how the kWh lie in quarter-hours; null where there are no interval data. */
export function settledHouse(plan: RatePlan, cycles: readonly Metered[], seed: number | null): SettledHouse {
  const known = {
    ...plan,
    charges: plan.charges.map((one) => (one.kWOf === 'demand' ? { ...one, kWOf: 'ac' as const } : one)),
  };
  let from: Day = FIRST;
  let held = EMPTY_OPENING;
  const usages: CycleUsage[] = [];
  const settled: SettledAmounts[] = [];
  for (const cycle of cycles) {
    const usage = usageOf(cycle, from, seed);
    const made = taken(settleAmounts(known, held, usage));
    usages.push(usage);
    settled.push(made);
    held = made.closing;
    from = usage.to;
  }
  return { plan: known, usages, settled };
}

function usageOf({ days, importKwh, exportKwh, ownKwh }: Metered, from: Day, seed: number | null): CycleUsage {
  const importWh = wh(importKwh * 1000);
  const exportWh = wh(exportKwh * 1000);
  const spread = (total: number, salt: number) => spreadOver(total, days * STEPS, (seed ?? 0) + salt);
  return {
    from,
    to: addDays(from, days),
    importWh,
    exportWh,
    productionWh: wh(exportWh + ownKwh * 1000),
    loadWh: wh(importWh + ownKwh * 1000),
    byPeriod: null,
    netted: {},
    kW: { dc: '11.48', ac: '9.6' },
    payments: [],
    finalBill: false,
    intervals:
      seed === null
        ? null
        : {
            // Midnight in Denver, daylight saving time.
            startUtc: `${from}T06:00:00Z`,
            minutes: 15,
            importWh: spread(importWh, 1),
            exportWh: spread(exportWh, 2),
            productionWh: spread(exportWh + ownKwh * 1000, 3),
          },
  };
}

/** Whole Wh of some steps that add up to a total, in the middle of the day and mostly in a few steps of it, as a seed says. */
function spreadOver(total: number, steps: number, seed: number): number[] {
  const isMidday = (at: number) => at % STEPS >= MIDDAY.from && at % STEPS < MIDDAY.to;
  const weights = Array.from({ length: steps }, (_, at) =>
    isMidday(at) ? (Math.imul(at + seed, 2_654_435_761) >>> 20) ** 2 : 0,
  );
  const all = weights.reduce((sum, weight) => sum + weight, 0);
  let seen = 0;
  let given = 0;
  return weights.map((weight) => {
    seen += weight;
    const upTo = Math.floor((total * seen) / all);
    const own = upTo - given;
    given = upTo;
    return own;
  });
}

/** How many places of a kWh are printed; null: all of them. */
export type Places = 0 | 2 | null;

/** The household with the statements of its cycles, printed as settled; `places` is what a statement rounds its kWh to. */
export function printedHousehold(house: SettledHouse, places: Places): HouseholdFacts {
  const built = buildHousehold({ bare: true, start: FIRST });
  return householdFacts.parse({
    ...built,
    house: { ...built.house, timeZone: 'America/Denver', longitude: -105, expectedMonthlyWh: null },
    plans: [{ from: '2025-01-01', plan: house.plan, withoutRoof: null }],
    statements: statementsOf(house, places),
    intervals: house.usages.flatMap(intervalDays),
  });
}

export function statementsOf({ usages, settled }: SettledHouse, places: Places): Statement[] {
  const registers = { import: 48_210, export: 1204, production: 310 };
  let lastDue: number | null = null;
  return usages.map((usage, at) => {
    const { lines, banks, amountDueCents } = settlementAt(settled, at);
    const read = (channel: RegisterRead['channel'], energy: number): RegisterRead => {
      const previous = registers[channel];
      registers[channel] = (previous + energy / 1000) % 1_000_000;
      return {
        meter: channel === 'production' ? 'prod' : 'net',
        channel,
        from: usage.from,
        to: usage.to,
        previous: String(previous),
        current: String(registers[channel]),
        dials: 6,
        multiplier: '1',
        type: 'actual',
        row: null,
      };
    };
    const previous = lastDue;
    lastDue = amountDueCents;
    return {
      id: `statement-${at + 1}`,
      revision: 1,
      from: usage.from,
      to: usage.to,
      printedDays: daysBetween(usage.from, usage.to),
      statementOn: addDays(usage.to, 3),
      dueOn: addDays(usage.to, 24),
      reads: [
        read('import', usage.importWh),
        read('export', usage.exportWh),
        read('production', Number(usage.productionWh)),
      ],
      importWh: usage.importWh,
      exportWh: usage.exportWh,
      productionWh: usage.productionWh,
      lines: lines.map(
        (line): PrintedLine => ({
          component: line.component,
          kind: line.kind,
          label: line.label,
          quantity: line.quantity !== null && line.unit === 'kWh' ? printed(line.quantity, places) : line.quantity,
          unit: line.unit,
          rate: line.rate,
          amountCents: line.amountCents,
          inDue: line.inDue,
          row: null,
        }),
      ),
      banks: banks.flatMap(({ bank, unit, period, move }) =>
        period === null
          ? [
              {
                bank,
                unit,
                open: kept(move.open, unit, places),
                close: kept(move.close, unit, places),
                sentOut: null,
                sentValueCents: null,
                row: null,
              },
            ]
          : [],
      ),
      previousBalanceCents: previous === null ? null : cents(previous),
      paymentsCents: previous === null ? null : cents(-previous),
      amountDueCents,
      budget: null,
      source: { kind: 'typed', by: 'Priya', on: addDays(usage.to, 5) },
      reason: null,
      enteredBy: 'Priya',
      enteredAt: `${addDays(usage.to, 5)}T18:00:00Z`,
    };
  });
}

function settlementAt(settled: readonly SettledAmounts[], at: number) {
  const found = settled[at];
  if (!found) throw new Error('a cycle that is not settled');
  return found.settlement;
}

function kept(amount: string, unit: 'kWh' | 'USD', places: Places): string {
  return unit === 'USD' ? amount : printed(amount, places);
}

function printed(kWh: string, places: Places): string {
  return places === null ? kWh : new Exact(kWh).toDecimalPlaces(places).toString();
}

function intervalDays({ from, to, intervals }: CycleUsage): IntervalDay[] {
  if (intervals === null) return [];
  const channels: [IntervalChannel, number[]][] = [
    ['import', intervals.importWh],
    ['export', intervals.exportWh],
    ['production', intervals.productionWh],
  ];
  return channels.flatMap(([channel, values]) =>
    Array.from({ length: daysBetween(from, to) }, (_, at) => ({
      channel,
      day: addDays(from, at),
      minutes: 15,
      values: values.slice(at * STEPS, (at + 1) * STEPS),
      documentId: null,
    })),
  );
}
