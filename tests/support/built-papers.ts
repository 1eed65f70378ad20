import type { IntervalChannel, IntervalDay, PrintedLine, RegisterRead, Statement } from '#shared/facts/papers.ts';
import { cents, dollarsText } from '#shared/units/cents.ts';
import { addDays, type Day, daysBetween } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';

/** What the meters of one built cycle saw and what its statement says, in whole kWh. */
export type BuiltCycle = {
  from: Day;
  to: Day;
  importKwh: number;
  exportKwh: number;
  productionKwh: number;
  /** Export as credited, where the statement is to be wrong; null: as metered. */
  creditedKwh: number | null;
  estimated: boolean;
};

/** Ten-thousandths of a dollar per kWh, per cycle, and of a fraction: those of `builtPlan`. */
const RATES = { energy: 1684, export: 950, customer: 145_000, benefits: 61, franchise: 310 };

/** Statements billed in whole numbers, in order; registers wind on, the bank and the balance carry. */
export function builtStatements(built: readonly BuiltCycle[], exportTo: 'bill' | 'creditBank'): Statement[] {
  const registers = { import: 48_210, export: 1204, production: 310 };
  let bank = 0;
  let lastDue = 0;
  return built.map((cycle, at) => {
    const credited = cycle.creditedKwh ?? cycle.exportKwh;
    const energy = priced(cycle.importKwh, RATES.energy);
    const benefits = priced(cycle.importKwh, RATES.benefits);
    const customer = RATES.customer / 100;
    const franchise = Math.floor(((energy + customer + benefits) * RATES.franchise + 5000) / 10_000);
    const earned = priced(credited, RATES.export);
    const used = exportTo === 'creditBank' ? Math.min(bank, energy) : 0;
    const lines: PrintedLine[] = [
      line('energy', 'import', 'Import', cycle.importKwh, '0.1684', energy, true),
      line('exportCredit', 'export', 'Export credit', credited, '0.0950', -earned, exportTo === 'bill'),
      line('customer', 'fixed', 'Customer charge', null, null, customer, true),
      line('benefits', 'nonbypassable', 'Public benefits, on import', cycle.importKwh, '0.0061', benefits, true),
      line('franchise', 'tax', 'City franchise, 3.1%', null, null, franchise, true),
      ...(exportTo === 'creditBank'
        ? [line('creditBank', 'credit', 'Credit brought in', null, null, -used, true)]
        : []),
    ];
    const open = bank;
    bank += exportTo === 'creditBank' ? earned - used : 0;
    const current = lines.reduce((sum, one) => sum + (one.inDue ? one.amountCents : 0), 0);
    const due = current;
    const statement: Statement = {
      id: `statement-${at + 1}`,
      revision: 1,
      from: cycle.from,
      to: cycle.to,
      printedDays: daysBetween(cycle.from, cycle.to),
      statementOn: addDays(cycle.to, 3),
      dueOn: addDays(cycle.to, 24),
      reads: [
        read(registers, 'net', 'import', cycle, cycle.importKwh, 5),
        read(registers, 'net', 'export', cycle, cycle.exportKwh, 5),
        read(registers, 'prod', 'production', cycle, cycle.productionKwh, 6),
      ],
      importWh: wh(cycle.importKwh * 1000),
      exportWh: wh(credited * 1000),
      productionWh: wh(cycle.productionKwh * 1000),
      lines,
      banks:
        exportTo === 'creditBank'
          ? [
              {
                bank: 'creditBank',
                unit: 'USD',
                open: dollarsText(cents(open)),
                close: dollarsText(cents(bank)),
                sentOut: null,
                sentValueCents: null,
                row: null,
              },
            ]
          : [],
      previousBalanceCents: at === 0 ? null : cents(lastDue),
      paymentsCents: at === 0 ? null : cents(-lastDue),
      amountDueCents: cents(due),
      budget: null,
      source: { kind: 'typed', by: 'Priya', on: addDays(cycle.to, 5) },
      reason: null,
      enteredBy: 'Priya',
      enteredAt: `${addDays(cycle.to, 5)}T18:00:00Z`,
    };
    lastDue = due;
    return statement;
  });
}

/** kWh × rate (in ten-thousandths of a dollar) in whole cents, half up. */
function priced(kwh: number, rate: number): number {
  return Math.floor((kwh * rate + 50) / 100);
}

function line(
  component: string,
  kind: PrintedLine['kind'],
  label: string,
  kwh: number | null,
  rate: string | null,
  amount: number,
  inDue: boolean,
): PrintedLine {
  return {
    component,
    kind,
    label,
    quantity: kwh === null ? null : String(kwh),
    unit: kwh === null ? null : 'kWh',
    rate,
    amountCents: cents(amount),
    inDue,
    row: null,
  };
}

function read(
  registers: Record<RegisterRead['channel'], number>,
  meter: string,
  channel: RegisterRead['channel'],
  cycle: BuiltCycle,
  kwh: number,
  dials: number,
): RegisterRead {
  const previous = registers[channel];
  const current = (previous + kwh) % 10 ** dials;
  registers[channel] = current;
  return {
    meter,
    channel,
    from: cycle.from,
    to: cycle.to,
    previous: String(previous),
    current: String(current),
    dials,
    multiplier: '1',
    type: cycle.estimated ? 'estimated' : 'actual',
    row: null,
  };
}

/** Interval days whose steps add up to what the meters saw. */
export function builtIntervals(
  built: readonly BuiltCycle[],
  channels: readonly IntervalChannel[],
  minutes: 60 | 1440,
): IntervalDay[] {
  const days: IntervalDay[] = [];
  for (const cycle of built) {
    const count = daysBetween(cycle.from, cycle.to);
    for (const channel of channels) {
      const kwh = {
        import: cycle.importKwh,
        export: cycle.exportKwh,
        production: cycle.productionKwh,
        monitor: cycle.productionKwh,
      }[channel];
      for (let at = 0; at < count; at += 1) {
        const total = Math.floor(((at + 1) * kwh * 1000) / count) - Math.floor((at * kwh * 1000) / count);
        days.push({
          channel,
          day: addDays(cycle.from, at),
          minutes,
          values: isMade(channel) ? byDay(total, minutes) : stepsOf(total, minutes),
          documentId: null,
        });
      }
    }
  }
  return days;
}

function isMade(channel: IntervalChannel): boolean {
  return channel === 'production' || channel === 'monitor';
}

/** What a roof makes, in equal steps from nine to three by the clock, when the sun is up all year round; a figure a day stays one. */
function byDay(total: number, minutes: 60 | 1440): number[] {
  if (minutes === 1440) return [total];
  const light = Array.from({ length: 6 }, (_, at) => Math.floor(((at + 1) * total) / 6) - Math.floor((at * total) / 6));
  return Array.from({ length: 24 }, (_, hour) => light[hour - 9] ?? 0);
}

/** A day's energy in equal steps, the remainder in the first ones. Days of 23 and 25 hours are not built. */
function stepsOf(total: number, minutes: 60 | 1440): number[] {
  const count = 1440 / minutes;
  return Array.from(
    { length: count },
    (_, at) => Math.floor(((at + 1) * total) / count) - Math.floor((at * total) / count),
  );
}
