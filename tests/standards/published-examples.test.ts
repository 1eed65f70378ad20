import { describe, expect, test } from 'vitest';
import { parsePlan } from '#shared/settlement/parse-plan.ts';
import { type SettledCycle, settleCycle } from '#shared/settlement/settle.ts';
import { type CycleUsage, EMPTY_OPENING, type Opening } from '#shared/settlement/settlement.ts';
import { cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { day } from '#shared/units/day.ts';
import { wh } from '#shared/units/energy.ts';
import { Exact, exact, kwhOf, usdOf } from '#shared/units/rate.ts';
import { taken } from '#tests/support/netmetering-adapter.ts';

/**
 * Worked examples that utilities and agencies have published, settled by the same engine. They are explanations to customers, weaker than
 * commission sources; each test says what was published and what had to be inferred.
 */
const FROM = '2025-01-01';
const energyAt = (rate: string) => ({
  id: 'energy',
  label: 'Energy',
  kind: 'import',
  basis: 'import',
  rates: [{ from: FROM, rate }],
});

/** Settles one cycle of 30 days, April 2026; kWh. */
function settleOne(
  plan: object,
  of: { import?: number; export?: number },
  opening: Partial<Opening> = {},
): SettledCycle {
  const usage: CycleUsage = {
    from: day('2026-04-01'),
    to: day('2026-05-01'),
    importWh: wh((of.import ?? 0) * 1000),
    exportWh: wh((of.export ?? 0) * 1000),
    productionWh: null,
    loadWh: null,
    byPeriod: null,
    netted: {},
    kW: {},
    payments: [],
    finalBill: false,
    intervals: null,
  };
  const read = taken(parsePlan({ timeZone: 'America/Los_Angeles', netting: 'none', ...plan }));
  return taken(settleCycle(read, { ...EMPTY_OPENING, ...opening }, usage));
}

describe('PE1: Washington public utility district, “Generating customers, here’s how to read your utility bill” (archived leaflet)', () => {
  // Published: energy 32.50, net metering credit 23.41, minimum 0.53 a day; to the reserve 6.81, total 15.90. 30 days are inferred (15.90 / 0.53).
  const bill = settleOne(
    {
      charges: [
        { ...energyAt('32.50'), basis: 'cycle' },
        {
          id: 'least',
          label: 'Minimum',
          kind: 'minimum',
          basis: 'floor',
          per: 'day',
          on: ['energy'],
          rates: [{ from: FROM, rate: '0.53' }],
        },
      ],
      credits: [
        {
          id: 'sent',
          label: 'Net metering credit',
          kind: 'export',
          basis: 'export',
          rates: [{ from: FROM, rate: '23.41' }],
          to: 'reserve',
        },
      ],
      banks: [
        { id: 'reserve', label: 'Reserve', unit: 'USD', sameCycle: true, offsets: ['energy'], keepMinimum: 'least' },
      ],
    },
    { export: 1 },
  );

  test('what the minimum keeps out of the credit goes to the reserve', () => {
    expect(bill.closing.banks.reserve).toBe('6.81');
    expect(dollarsText(bill.settlement.amountDueCents)).toBe('15.90');
  });
});

describe('PE2: Montana electric cooperative web page, net-metering bill table', () => {
  // Published: base 32.00 (standard 23.00), used 1000, generated 420; net 580 kWh, bill 81.88 against 109.00, saving 27.12. The rate 0.086 is
  // inferred from the standard bill.
  const base = (rate: string) => ({
    id: 'base',
    label: 'Base',
    kind: 'fixed',
    basis: 'cycle',
    rates: [{ from: FROM, rate }],
  });
  const net = settleOne(
    { netting: 'cycle', charges: [energyAt('0.086'), base('32.00')] },
    { import: 1000, export: 420 },
  );
  const standard = settleOne({ charges: [energyAt('0.086'), base('23.00')] }, { import: 1000 });

  test('the net bill, the standard bill and the saving are as printed', () => {
    expect(net.settlement.lines[0]?.quantity).toBe('580');
    expect(dollarsText(net.settlement.amountDueCents)).toBe('81.88');
    expect(dollarsText(standard.settlement.amountDueCents)).toBe('109.00');
    expect(dollarsText(cents(standard.settlement.amountDueCents - net.settlement.amountDueCents))).toBe('27.12');
  });
});

describe('PE3: Oregon public-purpose energy nonprofit, “Net Metering” page', () => {
  // Published: production 200 against a use of 200, 100 and 500; the meter reads 0, −100 and +300.
  test.each([
    [200, 0],
    [100, -100],
    [500, 300],
  ])('a use of %i reads %i', (use, reading) => {
    const banks = [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', offsets: ['energy'] }];
    const { settlement } = settleOne(
      { netting: 'cycle', charges: [energyAt('0.10')], banks },
      { import: use, export: 200 },
    );
    const billed = exact(settlement.lines[0]?.quantity ?? '');
    expect(billed.minus(exact(settlement.banks[0]?.move.earned ?? '')).toNumber()).toBe(reading);
  });
});

describe('PE4: Massachusetts distribution company sample bills, market net metering credit (60 % of excess)', () => {
  // Published: 123,027 kWh of excess are credited as 73,816, and 543 as 326: a scaled quantity is rounded to whole kWh.
  test.each([
    [123_027, '73816'],
    [543, '326'],
  ])('%i kWh of excess are banked as %s', (excess, credited) => {
    const banks = [{ id: 'kwhBank', label: 'kWh bank', unit: 'kWh', ratio: '0.60', offsets: ['energy'] }];
    const rounding = { money: 'halfUp', limits: 'whole', kWh: 'whole' };
    const { settlement } = settleOne(
      { netting: 'cycle', charges: [energyAt('0.10')], banks, rounding },
      { export: excess },
    );
    expect(settlement.banks[0]?.move.earned).toBe(credited);
  });
});

describe('PE5: City of Palo Alto, staff reports CMR 425:10 (2010) and ID 1403 (2011)', () => {
  // Published: 5.841 cents a kWh, 42 customers, $2,154 in all, about $51 each. The kWh, 36,877, are inferred from the total.
  const RATE = '0.05841';
  const trueUps = [{ at: 'everyCycle', action: 'pay', to: 'separate', rates: [{ from: FROM, rate: RATE }] }];
  const banks = [{ id: 'surplus', label: 'Surplus', unit: 'kWh', trueUps }];
  const paid = (kWh: string) => {
    const { settlement } = settleOne(
      { netting: 'cycle', charges: [energyAt('0.10')], banks },
      {},
      { banks: { surplus: kWh } },
    );
    return usdOf(settlement.payouts[0]?.amountCents ?? cents(0));
  };

  test('the surplus of all pays the published total, to the dollar', () => {
    expect(paid('36877').toDecimalPlaces(0).toString()).toBe('2154');
  });

  test('a customer’s even share pays about what each was said to get', () => {
    const share = kwhOf(wh(36_877_000)).div(42).toDecimalPlaces(3);
    const each = paid(share.toString());
    expect(each.toDecimalPlaces(0).toString()).toBe('51');
    expect(each.eq(new Exact('2154').div(42).toDecimalPlaces(2))).toBe(true);
    expect(parseDollars(each.toString())).toBe(5129);
  });
});
