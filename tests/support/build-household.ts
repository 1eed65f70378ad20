import { DEFAULT_ASSUMPTIONS, type HouseholdFacts, householdFacts } from '#shared/facts/household.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import { type RatePlanInput, ratePlanSchema } from '#shared/settlement/plan.ts';
import { EMPTY_OPENING } from '#shared/settlement/settlement.ts';
import { addDays, addMonths, type Day, day, monthOf } from '#shared/units/day.ts';
import { type BuiltCycle, builtIntervals, builtStatements } from './built-papers.ts';

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
