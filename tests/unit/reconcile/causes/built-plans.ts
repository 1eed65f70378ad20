import type { RatePlan } from '#shared/settlement/plan.ts';
import { planOf } from './billed-house.ts';

const FROM = '2025-01-01';
const SEASONS = {
  seasons: [
    { id: 'summer', from: '06-01', to: '09-30' },
    { id: 'winter', from: '10-01', to: '05-31' },
  ],
};
const PERIODS = [
  { id: 'peak', label: 'On-peak', when: [{ days: 'weekday' as const, from: '16:00', to: '21:00' }] },
  { id: 'off', label: 'Off-peak', when: 'rest' as const },
];

/** Net billing: all import charged, all export credited by season into a bank that pays energy; tax after credits; a price of June. */
export const netBilling: RatePlan = planOf({
  netting: 'none',
  calendar: SEASONS,
  charges: [
    {
      id: 'energy',
      label: 'Energy',
      kind: 'import',
      basis: 'import',
      rates: [
        { from: FROM, rate: '0.1425' },
        { from: '2026-06-01', rate: '0.1513' },
      ],
    },
    {
      id: 'benefits',
      label: 'Public benefits',
      kind: 'nonbypassable',
      basis: 'import',
      rates: [{ from: FROM, rate: '0.0061' }],
    },
    { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'day', rates: [{ from: FROM, rate: '0.41' }] },
    {
      id: 'tax',
      label: 'Sales tax',
      kind: 'tax',
      basis: 'percent',
      on: ['energy', 'customer'],
      afterCredits: true,
      rates: [{ from: FROM, rate: '0.0625' }],
    },
  ],
  credits: [
    {
      id: 'exportCredit',
      label: 'Export credit',
      kind: 'export',
      basis: 'export',
      to: 'bank',
      rates: [
        { from: FROM, season: 'summer', rate: '0.0982' },
        { from: FROM, season: 'winter', rate: '0.0614' },
      ],
    },
  ],
  banks: [
    {
      id: 'bank',
      label: 'Credit bank',
      unit: 'USD',
      sameCycle: true,
      offsets: ['energy'],
      trueUps: [{ at: { months: [9] }, action: 'pay', to: 'separate' }],
    },
  ],
});

/** Netting over the cycle with tiers, a kWh bank that runs off with April, a charge on all import, an incentive on production. */
export const netMetering: RatePlan = planOf({
  netting: 'cycle',
  charges: [
    {
      id: 'energy',
      label: 'Energy',
      kind: 'import',
      basis: 'import',
      rates: [
        { from: FROM, tier: 1, rate: '0.1180' },
        { from: FROM, tier: 2, rate: '0.1735' },
      ],
      tiers: [{ from: FROM, per: 'day', limits: ['10'] }],
    },
    { id: 'delivery', label: 'Delivery', kind: 'import', basis: 'import', rates: [{ from: FROM, rate: '0.0379' }] },
    {
      id: 'nonbypassable',
      label: 'Non-bypassable charge',
      kind: 'nonbypassable',
      basis: 'import',
      netting: 'none',
      rates: [{ from: FROM, rate: '0.0187' }],
    },
    { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'cycle', rates: [{ from: FROM, rate: '12.00' }] },
  ],
  credits: [
    {
      id: 'incentive',
      label: 'Production incentive',
      kind: 'incentive',
      basis: 'production',
      to: 'separate',
      rates: [{ from: FROM, rate: '0.0725' }],
    },
  ],
  banks: [
    {
      id: 'kwhBank',
      label: 'Energy bank',
      unit: 'kWh',
      offsets: ['energy', 'delivery'],
      trueUps: [{ at: { months: [4] }, action: 'expire' }],
    },
  ],
});

/** Time of use, netted by period, with a kWh bank for each period. */
export const byPeriod: RatePlan = planOf({
  netting: 'period',
  calendar: { periods: PERIODS },
  charges: [
    {
      id: 'energy',
      label: 'Energy',
      kind: 'import',
      basis: 'import',
      rates: [
        { from: FROM, period: 'peak', rate: '0.2417' },
        { from: FROM, period: 'off', rate: '0.1033' },
      ],
    },
    { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'cycle', rates: [{ from: FROM, rate: '12.00' }] },
  ],
  banks: [{ id: 'kwhBank', label: 'Energy bank', unit: 'kWh', byPeriod: true, offsets: ['energy'] }],
});

/** Netted by the hour; what is left is credited at three quarters of the energy rate, off the bill. */
export const hourly: RatePlan = planOf({
  netting: 'hour',
  charges: [
    {
      id: 'energy',
      label: 'Energy',
      kind: 'import',
      basis: 'import',
      rates: [
        { from: FROM, rate: '0.1502' },
        { from: '2026-01-01', rate: '0.1622' },
      ],
    },
    { id: 'customer', label: 'Customer charge', kind: 'fixed', basis: 'cycle', rates: [{ from: FROM, rate: '9.00' }] },
  ],
  credits: [
    {
      id: 'exportCredit',
      label: 'Export credit',
      kind: 'export',
      basis: 'export',
      to: 'bill',
      ratesOf: { charges: ['energy'], fraction: '0.75' },
    },
  ],
});
