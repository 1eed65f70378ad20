import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { PrintedLine } from '#shared/facts/papers.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import { matchParts, partKey } from '#shared/reconcile/match-parts.ts';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import type { RatePlan, RatePlanInput } from '#shared/settlement/plan.ts';
import type { SettledLine } from '#shared/settlement/settlement.ts';
import { cents } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { BUILT_TODAY, buildHousehold, builtPlan } from '#tests/support/build-household.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';
import { PROPERTY_RUNS } from '#tests/support/property-runs.ts';
import { changed, check, checksOf } from './built-checks.ts';

const FROM = '2025-01-01';
const ENERGY = { id: 'energy', label: 'Energy', kind: 'import', basis: 'import' } as const;
const PERIODS: NonNullable<RatePlanInput['calendar']>['periods'] = [
  { id: 'peak', label: 'On-peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
  { id: 'superOff', label: 'Super off-peak', when: [{ days: 'all', from: '00:00', to: '06:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' },
];
const BY_PERIOD = [
  { from: FROM, period: 'peak', rate: '0.30' },
  { from: FROM, period: 'superOff', rate: '0.08' },
  { from: FROM, period: 'off', rate: '0.10' },
];
const BY_TIER = [
  { from: FROM, tier: 1, rate: '0.12' },
  { from: FROM, tier: 2, rate: '0.20' },
];
const LIMITS = [{ from: FROM, per: 'cycle' as const, limits: ['400'] }];

function planWith(part: Partial<RatePlanInput>): RatePlan {
  return taken(parsePlan({ ...builtPlan('bill'), banks: [], ...part }));
}

const TIME_OF_USE = planWith({ calendar: { periods: PERIODS }, charges: [{ ...ENERGY, rates: BY_PERIOD }] });
const TIERED = planWith({ charges: [{ ...ENERGY, rates: BY_TIER, tiers: LIMITS }] });

function line(label: string, quantity: string, rate: string | null, amount: number): PrintedLine {
  const amountCents = cents(amount);
  return {
    component: 'energy',
    kind: 'import',
    label,
    quantity,
    unit: 'kWh',
    rate,
    amountCents,
    inDue: true,
    row: null,
  };
}

/** The second cycle's energy (520 kWh) printed in these lines. */
function printed(plan: RatePlan, lines: PrintedLine[]): HouseholdFacts {
  const facts = buildHousehold({ exportTo: 'bill' });
  const on = { ...facts, plans: [{ from: day(FROM), plan, withoutRoof: null }] };
  return changed(
    1,
    (s) => ({ ...s, lines: s.lines.flatMap((one) => (one.component === 'energy' ? lines : [one])) }),
    on,
  );
}

function prices(facts: HouseholdFacts) {
  return checksOf(facts, 1)
    .filter((one) => one.key.startsWith('linePrice:energy'))
    .map((one) => [one.key, one.title, one.stated, one.found, one.verdict]);
}

describe('a charge priced by time of day', () => {
  test('has a check for each printed line, told by the period its label names', () => {
    const facts = printed(TIME_OF_USE, [
      line('Energy, super off-peak', '100', null, 800),
      line('Energy, on-peak', '120', null, 1200),
      line('Energy, off-peak', '300', null, 3000),
    ]);
    expect(prices(facts)).toEqual([
      ['linePrice:energy:superOff', 'Price of Energy, super off-peak', '8.00', '8.00', 'agrees'],
      ['linePrice:energy:peak', 'Price of Energy, on-peak', '12.00', '36.00', 'differs'],
      ['linePrice:energy:off', 'Price of Energy, off-peak', '30.00', '30.00', 'agrees'],
    ]);
    expect(check(facts, 1, 'linePrice:energy:peak').cause).toBe(
      'Energy, on-peak is billed at $12.00; by the rate plan it is 120 kWh × $0.30, rounded to the cent, $36.00.',
    );
  });

  test('keeps its plain key where only one period is printed', () => {
    const facts = printed(TIME_OF_USE, [line('Energy', '520', '0.10', 5200)]);
    expect(prices(facts)).toEqual([['linePrice:energy', 'Price of Energy, Off-peak', '52.00', '52.00', 'agrees']]);
  });

  test('is told by its printed rate where the labels are all the same, and named by its period', () => {
    const facts = printed(TIME_OF_USE, [line('Energy', '220', '0.300', 6600), line('Energy', '300', '0.1', 3100)]);
    expect(prices(facts)).toEqual([
      ['linePrice:energy:peak', 'Price of Energy, On-peak', '66.00', '66.00', 'agrees'],
      ['linePrice:energy:off', 'Price of Energy, Off-peak', '31.00', '30.00', 'differs'],
    ]);
  });

  test('is named by the period’s id where the plan gives it no label', () => {
    const plain = planWith({
      calendar: { periods: PERIODS.map(({ label: _, ...period }) => period) },
      charges: [{ ...ENERGY, rates: BY_PERIOD }],
    });
    const facts = printed(plain, [line('Energy', '220', '0.300', 6600), line('Energy', '300', '0.1', 3000)]);
    expect(prices(facts).map(([key, title]) => [key, title])).toEqual([
      ['linePrice:energy:peak', 'Price of Energy, peak'],
      ['linePrice:energy:off', 'Price of Energy, off'],
    ]);
  });

  test('takes its lines together where one of them cannot be told', () => {
    const facts = printed(TIME_OF_USE, [line('Energy, on-peak', '220', null, 6600), line('Energy', '300', null, 3000)]);
    expect(prices(facts).map(([key]) => key)).toEqual(['linePrice:energy']);
  });

  test('has a price that changed inside the cycle taken together within its period, a cent for each line', () => {
    const facts = printed(TIME_OF_USE, [
      line('Energy, on-peak, old price', '100', null, 3001),
      line('Energy, on-peak, new price', '120', null, 3601),
      line('Energy, off-peak', '300', null, 3000),
    ]);
    expect(prices(facts)).toEqual([
      ['linePrice:energy:peak', 'Price of Energy, on-peak, old price', '66.02', '66.00', 'agrees'],
      ['linePrice:energy:off', 'Price of Energy, off-peak', '30.00', '30.00', 'agrees'],
    ]);
  });
});

describe('a charge in tiers', () => {
  const tiers = (first: [string, number], second: [string, number], labels = ['First 400 kWh', 'Over 400 kWh']) =>
    printed(TIERED, [
      line(labels[0] ?? '', first[0], null, first[1]),
      line(labels[1] ?? '', second[0], null, second[1]),
    ]);

  test('has a check for each, and one of where they end', () => {
    expect(prices(tiers(['400', 4800], ['120', 2400]))).toEqual([
      ['linePrice:energy:tier1', 'Price of First 400 kWh', '48.00', '48.00', 'agrees'],
      ['linePrice:energy:tier2', 'Price of Over 400 kWh', '24.00', '24.00', 'agrees'],
      ['linePrice:energy', 'Tiers of Energy', '72.00', '72.00', 'agrees'],
    ]);
  });

  test('that end elsewhere differ in their sum alone', () => {
    expect(prices(tiers(['300', 3600], ['220', 4400])).map(([key, , , , verdict]) => [key, verdict])).toEqual([
      ['linePrice:energy:tier1', 'agrees'],
      ['linePrice:energy:tier2', 'agrees'],
      ['linePrice:energy', 'differs'],
    ]);
  });

  test('at a wrong price differ in that line alone', () => {
    const wrong = tiers(['400', 4800], ['120', 2520], ['Tier 1', 'Tier 2']);
    expect(prices(wrong).map(([key, , , , verdict]) => [key, verdict])).toEqual([
      ['linePrice:energy:tier1', 'agrees'],
      ['linePrice:energy:tier2', 'differs'],
    ]);
  });

  test('in one line is run through the tiers, whatever rate is printed', () => {
    expect(prices(printed(TIERED, [line('Energy', '520', '0.12', 6240)]))).toEqual([
      ['linePrice:energy', 'Price of Energy', '62.40', '72.00', 'differs'],
    ]);
  });
});

describe('the part of a line', () => {
  const settled = (period: string | null, tier: number | null) =>
    ({ component: 'energy', period, tier }) as SettledLine;
  const parts = (plan: RatePlan, labels: [string, string | null][], ours: SettledLine[] = []) =>
    matchParts(
      labels.map(([label, rate]) => line(label, '1', rate, 1)),
      labels.map(() => 'energy'),
      plan,
      ours,
    ).map((part) => partKey('energy', part));

  test('is told by its place where as many are printed as are settled, and by nothing else', () => {
    const three = [settled('peak', null), settled('superOff', null), settled('off', null)];
    const same: [string, null][] = [
      ['Energy', null],
      ['Energy', null],
      ['Energy', null],
    ];
    expect(parts(TIME_OF_USE, same, three)).toEqual(['energy:peak', 'energy:superOff', 'energy:off']);
    expect(parts(TIME_OF_USE, same.slice(1), three)).toEqual(['energy', 'energy']);
    const two = [settled(null, 1), settled(null, 2)];
    expect(parts(TIERED, same.slice(1), two)).toEqual(['energy:tier1', 'energy:tier2']);
    expect(parts(TIERED, same, two)).toEqual(['energy', 'energy', 'energy']);
  });

  test('is no tier the plan does not have, and the last for “all additional kWh”', () => {
    expect(
      parts(TIERED, [
        ['Tier 1', null],
        ['Tier 3', null],
      ]),
    ).toEqual(['energy', 'energy']);
    expect(
      parts(TIERED, [
        ['Up to 400', null],
        ['All additional kWh', null],
      ]),
    ).toEqual(['energy:tier1', 'energy:tier2']);
    expect(
      parts(TIERED, [
        ['Energy', '0.12'],
        ['Energy', '0.2000'],
      ]),
    ).toEqual(['energy:tier1', 'energy:tier2']);
  });

  test('names period and tier where a charge has both', () => {
    const both = planWith({
      calendar: { periods: PERIODS },
      charges: [
        {
          ...ENERGY,
          tiers: LIMITS,
          rates: BY_PERIOD.flatMap((row) => [
            { ...row, tier: 1 },
            { ...row, tier: 2, rate: `${row.rate}5` },
          ]),
        },
      ],
    });
    expect(
      parts(both, [
        ['On-peak tier 1', null],
        ['On-peak tier 2', null],
        ['Off-peak', '0.10'],
      ]),
    ).toEqual(['energy:peak:tier1', 'energy:peak:tier2', 'energy:off:tier1']);
  });

  test('is read from the id of a period without a label, and a credit’s from the charge it is a share of', () => {
    const plan = planWith({
      calendar: {
        periods: [
          { id: 'onPeak', when: [{ days: 'all', from: '16:00', to: '21:00' }] },
          { id: 'night', when: 'rest' },
        ],
      },
      charges: [
        {
          ...ENERGY,
          rates: [
            { from: FROM, period: 'onPeak', rate: '0.30' },
            { from: FROM, period: 'night', rate: '0.10' },
          ],
        },
      ],
      credits: [
        {
          id: 'exportCredit',
          label: 'Credit',
          kind: 'export',
          basis: 'export',
          ratesOf: { charges: ['energy'] },
          to: 'bill',
        },
      ],
    });
    const credit = (label: string): PrintedLine => ({
      ...line(label, '1', null, -1),
      component: 'exportCredit',
      kind: 'export',
    });
    const told = matchParts(
      [credit('Credit on peak'), credit('Credit night')],
      ['exportCredit', 'exportCredit'],
      plan,
      [],
    );
    expect(told.map((part) => part?.period)).toEqual(['onPeak', 'night']);
  });

  test('is nothing for a line of a bank or of no component', () => {
    expect(matchParts([line('x', '1', null, 1)], [null], TIME_OF_USE, [])).toEqual([null]);
    expect(matchParts([line('x', '1', null, 1)], ['someBank'], TIME_OF_USE, [])).toEqual([null]);
  });

  test('does not hang on the order the lines are printed in', () => {
    const lines = [
      line('Energy on-peak', '1', null, 1),
      line('Energy off-peak', '1', null, 1),
      line('Super off-peak', '1', null, 1),
    ];
    const sorted = (of: PrintedLine[]) =>
      matchParts(
        of,
        of.map(() => 'energy'),
        TIME_OF_USE,
        [],
      )
        .map((part, at) => `${of[at]?.label} ${part?.period}`)
        .sort();
    fc.assert(
      fc.property(fc.shuffledSubarray(lines, { minLength: 3 }), (mixed) => {
        expect(sorted(mixed)).toEqual(sorted(lines));
      }),
      { numRuns: PROPERTY_RUNS },
    );
  });
});

describe('the facing pages', () => {
  const hourly = buildHousehold({
    exportTo: 'bill',
    intervals: { channels: ['import', 'export', 'production'], minutes: 60 },
  });
  const on = { ...hourly, plans: [{ from: day(FROM), plan: TIME_OF_USE, withoutRoof: null }] };
  const cycleOf = (facts: HouseholdFacts) => {
    const cycle = computeLedger(facts, { today: BUILT_TODAY }).cycles[1];
    if (!cycle?.settlement) throw new Error('a cycle that is not settled');
    return { facing: cycle.facing, ours: cycle.settlement.lines.filter(({ component }) => component === 'energy') };
  };

  test('face each printed line with ours of its period, whatever their order and however many', () => {
    const { ours } = cycleOf(on);
    const of = (period: string) => ours.find((one) => one.period === period);
    expect(ours.map(({ period }) => period)).toEqual(['peak', 'superOff', 'off']);
    const print = (label: string, period: string) => {
      const own = of(period);
      return line(label, own?.quantity ?? '0', null, own?.amountCents ?? 0);
    };
    const statement = changed(
      1,
      (s) => ({
        ...s,
        lines: s.lines.flatMap((one) =>
          one.component === 'energy' ? [print('Energy, off-peak', 'off'), print('Energy, on-peak', 'peak')] : [one],
        ),
      }),
      on,
    );
    const faced = cycleOf(statement)
      .facing.filter(({ key }) => key.startsWith('line:energy'))
      .map(({ key, label, billed, ours: mine }) => [
        key.replace(/:\d+$/, ''),
        label,
        billed?.amountCents ?? null,
        mine?.amountCents ?? null,
      ]);
    expect(faced).toEqual([
      ['line:energy:off', 'Energy, off-peak', of('off')?.amountCents, of('off')?.amountCents],
      ['line:energy:peak', 'Energy, on-peak', of('peak')?.amountCents, of('peak')?.amountCents],
      ['line:energy:superOff', 'Energy', null, of('superOff')?.amountCents],
    ]);
  });
});
