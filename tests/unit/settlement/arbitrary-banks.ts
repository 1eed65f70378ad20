import type { Shape } from './arbitrary-plan.ts';

/** The banks of a drawn plan. `payment`: the price of a kWh that is paid out. */
export function arbitraryBanks(is: Shape, payment: object[]): object[] {
  const common = { sameCycle: is.sameCycle, lotLife: is.lots ? { cycles: 2 } : null };
  const usd = { unit: 'USD', trueUps: trueUps(is, 'USD', payment), ...common };
  const kWh = { unit: 'kWh', trueUps: trueUps(is, 'kWh', payment), ratio: is.ratio, ...common };
  const supply = { id: 'bank', label: 'Bank', offsets: ['energy'], byPeriod: is.byPeriod, ...kWh };
  const keepMinimum = is.keepMinimum ? 'least' : null;
  switch (is.form) {
    case 'kWh':
      return [supply];
    case 'twoKWh':
      return [supply, { id: 'second', label: 'Wires bank', offsets: ['delivery'], ...kWh, ratio: '1' }];
    case 'USD':
      return [{ id: 'bank', label: 'Bank', offsets: ['energy', 'gross'], keepMinimum, ...usd }];
    case 'twoUSD':
      return [
        { id: 'bank', label: 'Bank', offsets: ['energy', 'gross'], keepMinimum, ...usd },
        { id: 'second', label: 'Delivery bank', offsets: ['delivery', 'customer'], ...usd },
      ];
    case 'ledger':
      // A year's ledger of dollars, and beside it the year's surplus of kWh, a memory only.
      return [
        { id: 'bank', label: 'Ledger', offsets: ['energy', 'gross'], belowZero: true, ...usd, lotLife: null },
        { id: 'surplus', label: 'Surplus', offsets: [], belowZero: true, ...kWh, lotLife: null },
      ];
    default:
      return [];
  }
}

function trueUps(is: Shape, unit: 'kWh' | 'USD', payment: object[]): object[] {
  if (is.trueUp === 'none') return [];
  const at = {
    months: { months: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12] },
    date: { date: '03-31' },
    everyCycle: 'everyCycle',
    finalBill: 'finalBill',
  }[is.at];
  const keep = {
    none: null,
    amount: { amount: '40' },
    import: { averageCycles: 1, usage: 'import' },
    load: { averageCycles: 2, usage: 'load' },
    net: { averageCycles: 1, usage: 'net' },
  }[unit === 'USD' && is.keep !== 'none' ? 'amount' : is.keep];
  const atLeast = is.keep === 'none' ? '5' : '0';
  if (is.trueUp === 'expire' || is.trueUp === 'donate') return [{ at, keep, atLeast, action: is.trueUp }];
  const to = is.trueUp === 'payBill' ? 'bill' : 'separate';
  return [{ at, keep, atLeast, action: 'pay', to, fee: '2.50', ...(unit === 'kWh' ? { rates: payment } : {}) }];
}
