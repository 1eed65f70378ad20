import { Decimal } from 'decimal.js';
import { type Cents, cents } from './cents.ts';
import { type Wh, wh } from './energy.ts';

/** Decimal with the precision the trade needs: 40 digits, so that a quotient carried to the line is exact to the cent. */
export const Exact = Decimal.clone({
  precision: 40,
  rounding: Decimal.ROUND_HALF_UP,
  toExpNeg: -40,
  toExpPos: 40,
});
export type Exact = Decimal;

export type MoneyRounding = 'halfUp' | 'halfEven';

const parsed = new Map<string, Exact>();

/** Parses an exact decimal text; parsed rates are remembered, since a plan has few and a ledger uses them often. */
export function exact(value: string): Exact {
  const known = parsed.get(value);
  if (known) return known;
  const made = new Exact(value);
  if (parsed.size < 4096) parsed.set(value, made);
  return made;
}

/** USD to whole cents, once, at the line: half away from zero unless the plan says half to even. */
export function roundToCents(usd: Exact, rounding: MoneyRounding = 'halfUp'): Cents {
  const mode = rounding === 'halfEven' ? Decimal.ROUND_HALF_EVEN : Decimal.ROUND_HALF_UP;
  return cents(usd.times(100).toDecimalPlaces(0, mode).toNumber());
}

/** Cents as exact USD. */
export function usdOf(amount: Cents): Exact {
  return new Exact(amount).div(100);
}

/** Wh as exact kWh. */
export function kwhOf(amount: Wh): Exact {
  return new Exact(amount).div(1000);
}

/** Exact kWh to the nearest Wh, half away from zero. */
export function roundToWh(kwh: Exact): Wh {
  return wh(kwh.times(1000).toDecimalPlaces(0, Decimal.ROUND_HALF_UP).toNumber());
}

/** An exact value as plain text without exponent; a quotient without end is shown to six decimals. */
export function decimalTextOf(value: Exact): string {
  return (value.decimalPlaces() > 12 ? value.toDecimalPlaces(6, Decimal.ROUND_HALF_UP) : value).toString();
}
