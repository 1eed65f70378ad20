import { type Cents, cents } from '../units/cents.ts';
import { type Wh, wh } from '../units/energy.ts';
import { decimalTextOf, Exact, exact, type MoneyRounding, roundToCents, roundToWh } from '../units/rate.ts';
import { refuse } from './refused.ts';

/**
 * An exact amount in thousandths of its unit (Wh for kWh, W for kW, tenths of a cent for USD, thousandths of a day or a cycle): a whole number
 * while it is one and safe, else an exact decimal. Whole numbers keep a settlement fast; the decimal keeps it right.
 */
export type Qty = number | Exact;

/** A quantity that may not end as a decimal: `n / d` thousandths, `d` positive. */
export type Ratio = { n: Qty; d: Qty };

/** A rate as a whole number over a power of ten, beside its text; `int` is null when it does not fit a safe whole number. */
export type Rate = { text: string; int: number | null; scale: number };

export const ONE_UNIT = 1000;

/** Ten billion dollars in cents: beyond it a rate or a read is mistyped, and sums would leave the safe whole numbers. */
const MOST_CENTS = 10 ** 12;

const POWERS_OF_TEN = Array.from({ length: 16 }, (_, index) => 10 ** index);

export function rateOf(text: string): Rate {
  const dot = text.indexOf('.');
  const scale = dot < 0 ? 0 : text.length - dot - 1;
  const int = Number(dot < 0 ? text : text.slice(0, dot) + text.slice(dot + 1));
  return { text, int: Number.isSafeInteger(int) ? int : null, scale };
}

function qty(value: Exact): Qty {
  const whole = value.toNumber();
  return Number.isSafeInteger(whole) && value.eq(whole) ? whole : value;
}

export function big(value: Qty): Exact {
  return typeof value === 'number' ? new Exact(value) : value;
}

/** Decimal text in units ("12.5") as thousandths. */
export function qtyOfText(text: string): Qty {
  const rate = rateOf(text);
  const factor = POWERS_OF_TEN[3 - rate.scale];
  if (rate.int !== null && factor !== undefined && Number.isSafeInteger(rate.int * factor)) return rate.int * factor;
  return qty(exact(text).times(ONE_UNIT));
}

export function plus(a: Qty, b: Qty): Qty {
  if (typeof a === 'number' && typeof b === 'number') {
    const sum = a + b;
    if (Number.isSafeInteger(sum)) return sum;
  }
  return qty(big(a).plus(big(b)));
}

export function minus(a: Qty, b: Qty): Qty {
  if (typeof a === 'number' && typeof b === 'number') {
    const rest = a - b;
    if (Number.isSafeInteger(rest)) return rest;
  }
  return qty(big(a).minus(big(b)));
}

export function times(a: Qty, b: Qty): Qty {
  if (typeof a === 'number' && typeof b === 'number') {
    const product = a * b;
    if (Number.isSafeInteger(product)) return product;
  }
  return qty(big(a).times(big(b)));
}

export function compare(a: Qty, b: Qty): number {
  if (typeof a === 'number' && typeof b === 'number') return a - b;
  return big(a).cmp(big(b));
}

export function sizeOf(value: Qty): Qty {
  return typeof value === 'number' ? Math.abs(value) : value.abs();
}

export function lesser(a: Qty, b: Qty): Qty {
  return compare(a, b) <= 0 ? a : b;
}

export function greater(a: Qty, b: Qty): Qty {
  return compare(a, b) >= 0 ? a : b;
}

/** `n / d` to a whole unit (thousandths that are a multiple of 1000), half away from zero. */
export function roundToWhole(n: Qty, d: Qty): Qty {
  if (typeof n === 'number' && typeof d === 'number' && Number.isSafeInteger(d * ONE_UNIT)) {
    return roundedQuotient(n, d * ONE_UNIT, 'halfUp') * ONE_UNIT;
  }
  return qty(big(n).div(big(d)).div(ONE_UNIT).toDecimalPlaces(0, Exact.ROUND_HALF_UP).times(ONE_UNIT));
}

/** A quantity times a ratio that is itself in thousandths. */
export function scaled(value: Qty, ratio: Qty): Qty {
  return ratio === ONE_UNIT ? value : qty(big(value).times(big(ratio)).div(ONE_UNIT));
}

/** A quantity as text in its unit; one that does not end is shown to six decimals. */
export function qtyText(value: Qty): string {
  if (typeof value !== 'number') return decimalTextOf(value.div(ONE_UNIT));
  if (value % ONE_UNIT === 0) return String(value === 0 ? 0 : value / ONE_UNIT);
  const size = Math.abs(value);
  const tail = String(size % ONE_UNIT)
    .padStart(3, '0')
    .replace(/0+$/, '');
  return `${value < 0 ? '-' : ''}${Math.floor(size / ONE_UNIT)}.${tail}`;
}

/** A quantity as text with all its digits, for the inputs of a working. */
export function exactText(value: Qty): string {
  return typeof value === 'number' ? qtyText(value) : value.div(ONE_UNIT).toString();
}

/** USD to the nearest cent, half away from zero. */
export function roundedCents(value: Qty): Cents {
  return typeof value === 'number' && value % 10 === 0 ? cents(value / 10) : roundToCents(big(value).div(ONE_UNIT));
}

/** Thousandths of a kWh to the nearest Wh, half away from zero. */
export function whOfQty(value: Qty): Wh {
  return typeof value === 'number' ? wh(value) : roundToWh(value.div(ONE_UNIT));
}

export function ratioText(ratio: Ratio): string {
  return ratio.d === 1 ? qtyText(ratio.n) : decimalTextOf(big(ratio.n).div(big(ratio.d)).div(ONE_UNIT));
}

/**
 * Quantity × rate in cents, rounded once. Whole-number arithmetic while every product stays below 2^53, else exact decimals; both
 * multiply first and divide last, so they agree on every half cent (tested against each other).
 */
export function priced(n: Qty, d: Qty, rate: Rate, rounding: MoneyRounding): Cents {
  if (typeof n === 'number' && typeof d === 'number' && rate.int !== null) {
    // thousandths × rate × 100 cents = n × int / (d × 10^scale × 10)
    const power = POWERS_OF_TEN[rate.scale + 1];
    const top = n * rate.int;
    const bottom = power === undefined ? Number.NaN : d * power;
    if (Number.isSafeInteger(top) && Number.isSafeInteger(bottom)) {
      return sensible(roundedQuotient(top, bottom, rounding));
    }
  }
  return pricedExactly(n, d, rate.text, rounding);
}

/** The same by exact decimals alone. */
export function pricedExactly(n: Qty, d: Qty, rate: string, rounding: MoneyRounding): Cents {
  const usd = big(n).times(exact(rate)).div(big(d)).div(ONE_UNIT);
  return usd.abs().gt(MOST_CENTS) ? sensible(MOST_CENTS + 1) : sensible(roundToCents(usd, rounding));
}

function sensible(amount: number): Cents {
  if (Math.abs(amount) > MOST_CENTS)
    refuse('A line comes to more than any house could owe. Check the rates and the kWh.');
  return cents(amount);
}

function roundedQuotient(top: number, bottom: number, rounding: MoneyRounding): number {
  const size = Math.abs(top);
  const rest = size % bottom;
  let whole = (size - rest) / bottom;
  const other = bottom - rest;
  if (rest > other || (rest === other && (rounding === 'halfUp' || whole % 2 === 1))) whole += 1;
  return top < 0 ? -whole : whole;
}
