import { describe, expect, test } from 'vitest';
import type { CycleUsage } from '#shared/settlement/settlement.ts';
import { ENERGY, plan, refusal, said, settled, TWO_SEASONS, usage } from './plans.ts';

type Steps = NonNullable<CycleUsage['intervals']>;

/** Steps of a number of minutes from an instant, each given by a function of its place. */
function steps(
  startUtc: string,
  minutes: number,
  count: number,
  at: (step: number) => { in?: number; out?: number; made?: number },
): Steps {
  const all = Array.from({ length: count }, (_, step) => at(step));
  return {
    startUtc,
    minutes,
    importWh: all.map((one) => one.in ?? 0),
    exportWh: all.map((one) => one.out ?? 0),
    productionWh: all.map((one) => one.made ?? 0),
  };
}

const EXPORTED = { ...ENERGY, id: 'exported', label: 'Exported', basis: 'export' };
const both = (part: object = {}) => plan({ charges: [ENERGY, EXPORTED], ...part });
const quantities = (of: ReturnType<typeof plan>, cycle: ReturnType<typeof usage>) =>
  settled(of, cycle).settlement.lines.map((line) => line.quantity);

describe('netting by clock blocks', () => {
  // 1 November 2026 in Denver: midnight is 06:00 UTC, and the hour from 01:00 comes twice.
  const changeDay = { from: '2026-11-01', to: '2026-11-02' };
  const fiftyHours = (at: Parameters<typeof steps>[3]) =>
    usage({ ...changeDay, intervals: steps('2026-11-01T06:00:00Z', 30, 50, at) });

  test('takes an hour that comes twice when daylight saving time ends as two hours', () => {
    // Import in the first 01:00–02:00, export in the second: one block would net them to nothing.
    const cycle = fiftyHours((step) => (step === 2 ? { in: 1000 } : step === 4 ? { out: 1000 } : {}));
    expect(quantities(both({ netting: 'hour' }), cycle)).toEqual(['1', '1']);
    const sameHour = fiftyHours((step) => (step === 2 ? { in: 1000 } : step === 3 ? { out: 400 } : {}));
    expect(quantities(both({ netting: 'hour' }), sameHour)).toEqual(['0.6', '0']);
  });

  test('adds up what was made in each period to the Wh', () => {
    const of = plan({
      netting: 'none',
      calendar: {
        periods: [
          { id: 'noon', when: [{ days: 'all', from: '11:00', to: '13:00' }] },
          { id: 'else', when: 'rest' },
        ],
      },
      charges: [ENERGY],
      credits: [
        {
          id: 'made',
          label: 'Made',
          kind: 'export',
          basis: 'production',
          to: 'bill',
          rates: [
            { from: '2025-01-01', period: 'noon', rate: '0.10' },
            { from: '2025-01-01', period: 'else', rate: '0.10' },
          ],
        },
      ],
    });
    const intervals = steps('2026-06-01T06:00:00Z', 60, 24, (step) => ({
      made: step === 11 || step === 12 ? 7 : step === 14 ? 5 : 0,
    }));
    const cycle = usage({ from: '2026-06-01', to: '2026-06-02', production: 0.019, intervals });
    expect(quantities(of, cycle).slice(1)).toEqual(['0.014', '0.005']);
  });

  test('in steps of five minutes follows the clock through the night it is set back, as in steps of thirty', () => {
    const fine = usage({
      ...changeDay,
      intervals: steps('2026-11-01T06:00:00Z', 5, 300, (step) =>
        step === 12 ? { in: 1000 } : step === 23 ? { out: 300 } : step === 24 ? { out: 500 } : {},
      ),
    });
    // The export of 01:55 is in the import's hour; that of the second 01:00 is not.
    expect(quantities(both({ netting: 'hour' }), fine)).toEqual(['0.7', '0.5']);
  });

  test('follows the clock of zones whose hours begin at half past in UTC', () => {
    const of = both({ netting: 'hour', timeZone: 'Asia/Kolkata' });
    const cycle = (first: number) =>
      usage({
        from: '2026-06-01',
        to: '2026-06-02',
        intervals: steps('2026-05-31T18:30:00Z', 30, 48, (step) =>
          step === first ? { in: 1000 } : step === first + 1 ? { out: 1000 } : {},
        ),
      });
    expect(quantities(of, cycle(0))).toEqual(['0', '0']);
    expect(quantities(of, cycle(1))).toEqual(['1', '1']);
  });

  test('needs steps no longer than its blocks, and data for the whole cycle', () => {
    expect(
      refusal(
        both({ netting: '15min' }),
        fiftyHours(() => ({})),
      ),
    ).toMatch(/blocks of 15 minutes/);
    const short = usage({
      from: '2026-11-01',
      to: '2026-11-03',
      intervals: steps('2026-11-01T06:00:00Z', 30, 50, () => ({})),
    });
    expect(refusal(both({ netting: 'hour' }), short)).toMatch(/do not cover the whole cycle/);
  });
});

describe('periods from interval data', () => {
  const periods = [
    { id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] },
    { id: 'off', label: 'Off-peak', when: 'rest' },
  ];
  const rates = [
    { from: '2025-01-01', period: 'peak', rate: '0.30' },
    { from: '2025-01-01', period: 'off', rate: '0.10' },
  ];
  // Friday 3 and Saturday 4 July 2026; Denver's midnight is 06:00 UTC.
  const twoDays = usage({
    from: '2026-07-03',
    to: '2026-07-05',
    import: 48,
    export: 4,
    production: 10,
    intervals: steps('2026-07-03T06:00:00Z', 60, 48, (step) => ({
      in: 1000,
      out: step === 17 ? 4000 : 0,
      made: step === 12 ? 10_000 : 0,
    })),
  });

  test('are told by the local clock and the weekday', () => {
    const of = plan({ calendar: { periods }, charges: [{ ...ENERGY, rates }] });
    expect(said(settled(of, twoDays).settlement.lines)).toEqual([
      'energy peak 5 kWh at 0.30 = 1.50',
      'energy off 43 kWh at 0.10 = 4.30',
    ]);
  });

  test('are netted over the cycle in each period, or in each hour', () => {
    const of = (netting: string) => plan({ netting, calendar: { periods }, charges: [{ ...ENERGY, rates }] });
    expect(quantities(of('period'), twoDays)).toEqual(['1', '43']);
    expect(quantities(of('hour'), twoDays)).toEqual(['4', '43']);
  });

  test('hold the whole use too, where production is among the data', () => {
    const of = plan({ load: 'computed', calendar: { periods }, charges: [{ ...ENERGY, basis: 'load', rates }] });
    expect(quantities(of, twoDays)).toEqual(['1', '53']);
    const sold = plan({ calendar: { periods }, charges: [{ ...ENERGY, basis: 'production', rates }] });
    expect(quantities(sold, twoDays)).toEqual(['0', '10']);
  });

  test('that leave an hour out cannot price by period', () => {
    const gap = [{ id: 'peak', label: 'Peak', when: [{ days: 'weekday', from: '16:00', to: '21:00' }] }];
    const of = plan({ calendar: { periods: gap }, charges: [{ ...ENERGY, rates: rates.slice(0, 1) }] });
    expect(refusal(of, twoDays)).toMatch(/by period is needed/);
  });
});

describe('a change told interval by interval', () => {
  const rates = [
    { from: '2025-01-01', rate: '0.10' },
    { from: '2026-07-04', rate: '0.20' },
  ];
  const intervals = steps('2026-07-03T06:00:00Z', 60, 48, (step) => ({ in: step < 24 ? 250 : 750, made: 100 }));
  const twoDays = usage({ from: '2026-07-03', to: '2026-07-05', import: 24, production: 4.8, intervals });

  test('prices each interval at its own time, and what is not kWh by days', () => {
    const fixed = {
      ...ENERGY,
      id: 'customer',
      kind: 'fixed',
      basis: 'cycle',
      rates: [
        { from: '2025-01-01', rate: '1' },
        { from: '2026-07-04', rate: '2' },
      ],
    };
    const of = plan({ rateChangeBy: 'intervals', charges: [{ ...ENERGY, rates }, fixed] });
    expect(said(settled(of, twoDays).settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 6 kWh at 0.10 = 0.60',
      'energy 2026-07-04..2026-07-05 18 kWh at 0.20 = 3.60',
      'customer 2026-07-03..2026-07-04 0.5 cycle at 1 = 0.50',
      'customer 2026-07-04..2026-07-05 0.5 cycle at 2 = 1.00',
    ]);
  });

  test('is by days under netting over the cycle, and needs the data otherwise', () => {
    const netted = plan({ netting: 'cycle', rateChangeBy: 'intervals', charges: [{ ...ENERGY, rates }] });
    expect(quantities(netted, twoDays)).toEqual(['12', '12']);
    const gross = plan({ rateChangeBy: 'intervals', charges: [{ ...ENERGY, rates }] });
    expect(refusal(gross, { ...twoDays, intervals: null })).toMatch(/needs interval data/);
  });

  test('may be the season’s while prices change by days: the one inside the other', () => {
    const bySeason = [
      { from: '2025-01-01', season: 'winter', rate: '0.10' },
      { from: '2025-01-01', season: 'summer', rate: '0.20' },
      { from: '2026-06-02', season: 'summer', rate: '0.30' },
    ];
    const of = plan({
      seasonBy: 'intervals',
      calendar: { seasons: TWO_SEASONS },
      charges: [{ ...ENERGY, rates: bySeason }],
    });
    const data = steps('2026-05-31T06:00:00Z', 60, 72, (step) => ({ in: step < 24 ? 100 : 500 }));
    const { settlement } = settled(of, usage({ from: '2026-05-31', to: '2026-06-03', import: 26.4, intervals: data }));
    expect(said(settlement.lines)).toEqual([
      'energy 2026-05-31..2026-06-01 2.4 kWh at 0.10 = 0.24',
      'energy 2026-06-01..2026-06-02 12 kWh at 0.20 = 2.40',
      'energy 2026-06-02..2026-06-03 12 kWh at 0.30 = 3.60',
    ]);
  });

  test('shares what a kWh bank has paid in the proportion of each stretch', () => {
    const bank = { id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] };
    const of = plan({ rateChangeBy: 'intervals', charges: [{ ...ENERGY, rates }], banks: [bank] });
    const { settlement } = settled(of, twoDays, {
      banks: { kwhBank: '8' },
      usageSinceTrueUp: {},
      capUsed: {},
      balanceCents: null,
    });
    expect(said(settlement.lines)).toEqual([
      'energy 2026-07-03..2026-07-04 4 kWh at 0.10 = 0.40',
      'energy 2026-07-04..2026-07-05 12 kWh at 0.20 = 2.40',
    ]);
  });
});
