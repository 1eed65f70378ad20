import { DEFAULT_ASSUMPTIONS, type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import type { IntervalChannel, IntervalDay, PrintedLine, RegisterRead, Statement } from '#shared/facts/papers.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { cents, dollarsText } from '#shared/units/cents.ts';
import { addDays, addMonths, type Day, day, daysBetween, monthOf } from '#shared/units/day.ts';
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

export type BuildOptions = {
  cycles?: number;
  /** First day of the first cycle; every cycle is a month. */
  start?: Day;
  /** Where the export credit goes: off the same bill, or into a bank that pays energy from the next cycle on. */
  exportTo?: 'bill' | 'creditBank';
  /** Interval data by day in steps of so many minutes for these channels; none by default. */
  intervals?: { channels: IntervalChannel[]; minutes: 60 | 1440 } | null;
  /** Changes a cycle before its statement is made. */
  change?: (cycle: BuiltCycle, index: number) => BuiltCycle;
  /** Leaves out loan, mortgage, credit, incentive, costs. */
  bare?: boolean;
};

export const BUILT_TODAY: Day = day('2026-12-01');

const RATES = { energy: 1684, export: 950, customer: 145_000, benefits: 61, franchise: 310 };
const START = day('2025-06-14');

/** By month, January first: plausible whole kWh of a house with a roof of 11 kW. */
const PRODUCTION = [520, 690, 1010, 1240, 1390, 1420, 1450, 1310, 1080, 830, 560, 460];
const IMPORT = [720, 610, 520, 430, 390, 450, 520, 498, 470, 480, 590, 700];
const EXPORT = [90, 150, 280, 420, 480, 430, 390, 256, 260, 210, 120, 80];

/**
 * A household of a few clean cycles whose bills agree with its meters: net billing at flat rates, a customer charge, a charge on import
 * and a percent tax. Bills are worked out here in whole numbers, apart from the settlement code they are used to test.
 */
export function buildHousehold(options: BuildOptions = {}): HouseholdFacts {
  const { cycles = 3, start = START, exportTo = 'creditBank', intervals = null, change, bare = false } = options;
  const built: BuiltCycle[] = [];
  for (let at = 0; at < cycles; at += 1) {
    const from = addMonths(start, at);
    const to = addMonths(start, at + 1);
    const month = monthOf(from) - 1;
    const cycle: BuiltCycle = {
      from,
      to,
      importKwh: IMPORT[month] ?? 0,
      exportKwh: EXPORT[month] ?? 0,
      productionKwh: PRODUCTION[month] ?? 0,
      creditedKwh: null,
      estimated: false,
    };
    built.push(change ? change(cycle, at) : cycle);
  }
  return householdFacts.parse({
    house: {
      name: '12 Tern Lane',
      place: 'Port Calder',
      utility: 'Harrow Bay Electric Cooperative',
      timeZone: 'America/New_York',
      latitude: 41.2,
      longitude: -72.1,
      switchOn: start,
      arrays: [
        { id: 'south', label: 'South', modules: 18, moduleWatts: 410, tiltDegrees: 28, facingDegrees: 182 },
        { id: 'west', label: 'West', modules: 10, moduleWatts: 410, tiltDegrees: 28, facingDegrees: 268 },
      ],
      inverterAcWatts: 9600,
      expectedMonthlyWh: PRODUCTION.map((kwh) => kwh * 1000),
      meters: [
        { id: 'net', label: 'Net meter', channels: ['import', 'export'], dials: 5, multiplier: '1' },
        { id: 'prod', label: 'Production meter', channels: ['production'], dials: 6, multiplier: '1' },
      ],
    },
    plans: [{ from: '2025-01-01', plan: builtPlan(exportTo), withoutRoof: null }],
    opening: EMPTY_OPENING,
    loan: bare
      ? null
      : {
          lender: 'Calder Savings',
          principalCents: 2_940_000,
          dealerFeeCents: 240_000,
          annualRate: '0.0599',
          termMonths: 180,
          fundedOn: '2025-05-20',
          firstPaymentOn: '2025-07-01',
          payments: [],
        },
    mortgage: bare
      ? null
      : {
          lender: 'Harbour Mortgage',
          kind: 'conventional',
          principalCents: 34_200_000,
          annualRate: '0.0425',
          termMonths: 360,
          firstPaymentOn: '2021-10-01',
          originalValueCents: 38_000_000,
          extraPrincipalMonthlyCents: 0,
          endedOn: null,
          insurance: {
            premiumMonthlyCents: 9400,
            removedOn: '2025-09-01',
            becauseOfRoof: true,
            endRule: 'prudent',
            appreciationOn: null,
          },
        },
    credit: bare
      ? null
      : {
          placedInServiceOn: '2025-06-10',
          costs: [
            { id: 'contract', label: 'Installed system', amountCents: 3_480_000, treatment: 'qualified', reason: null },
          ],
          homeShare: '1',
          years: [
            {
              taxYear: 2025,
              limitCents: 520_000,
              status: 'filed',
              filedOn: '2026-03-08',
              refundOn: '2026-03-29',
              asRefund: true,
              typedBy: 'Priya',
            },
            {
              taxYear: 2026,
              limitCents: null,
              status: 'planned',
              filedOn: null,
              refundOn: null,
              asRefund: true,
              typedBy: null,
            },
          ],
        },
    incentive: bare
      ? null
      : {
          payer: 'Harrow Bay Electric Cooperative',
          ratePerKwh: '0.045',
          firstDay: start,
          lastDay: addDays(addMonths(start, 96), -1),
          paidAs: 'separate',
          received: [{ id: 'r1', on: addDays(addMonths(start, 2), 6), amountCents: 9000, note: null }],
        },
    costs: bare
      ? []
      : [
          {
            id: 'down',
            on: '2025-05-20',
            kind: 'signing',
            label: 'Cash at signing',
            amountCents: 540_000,
            documentId: null,
          },
          {
            id: 'clean',
            on: addMonths(start, 1),
            kind: 'upkeep',
            label: 'Panels washed',
            amountCents: 14_000,
            documentId: null,
          },
        ],
    usageBefore: [],
    documents: [],
    statements: builtStatements(built, exportTo),
    intervals: intervals === null ? [] : builtIntervals(built, intervals.channels, intervals.minutes),
    accepted: [],
    assumptions: DEFAULT_ASSUMPTIONS,
  });
}

/** The plan of the built household, complete. */
export function builtPlan(exportTo: 'bill' | 'creditBank'): ReturnType<typeof ratePlanSchema.parse> {
  const from = '2025-01-01';
  const input: RatePlanInput = {
    name: 'Residential with a roof',
    timeZone: 'America/New_York',
    netting: 'none',
    charges: [
      { id: 'energy', label: 'Import', kind: 'import', basis: 'import', rates: [{ from, rate: '0.1684' }] },
      { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'cycle', rates: [{ from, rate: '14.50' }] },
      {
        id: 'benefits',
        label: 'Public benefits, on import',
        kind: 'nonbypassable',
        basis: 'import',
        rates: [{ from, rate: '0.0061' }],
      },
      {
        id: 'franchise',
        label: 'City franchise, 3.1%',
        kind: 'tax',
        basis: 'percent',
        on: ['energy', 'customer', 'benefits'],
        rates: [{ from, rate: '0.031' }],
      },
    ],
    credits: [
      {
        id: 'exportCredit',
        label: 'Export credit',
        kind: 'export',
        basis: 'export',
        rates: [{ from, rate: '0.0950' }],
        to: exportTo,
      },
    ],
    banks: [
      {
        id: 'creditBank',
        label: 'Credit brought in',
        unit: 'USD',
        sameCycle: false,
        offsets: ['energy'],
        trueUps: [],
      },
    ],
  };
  return ratePlanSchema.parse(input);
}

function builtStatements(built: readonly BuiltCycle[], exportTo: 'bill' | 'creditBank'): Statement[] {
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
                row: null,
              },
            ]
          : [],
      previousBalanceCents: at === 0 ? null : cents(lastDue),
      paymentsCents: at === 0 ? null : cents(-lastDue),
      amountDueCents: cents(due),
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

function builtIntervals(
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
          values: stepsOf(total, minutes),
          documentId: null,
        });
      }
    }
  }
  return days;
}

/** A day's energy in equal steps, the remainder in the first ones. Days of 23 and 25 hours are not built. */
function stepsOf(total: number, minutes: 60 | 1440): number[] {
  const count = 1440 / minutes;
  return Array.from(
    { length: count },
    (_, at) => Math.floor(((at + 1) * total) / count) - Math.floor((at * total) / count),
  );
}
