import * as z from 'zod/mini';
import { splitWhole } from './split.ts';

declare const centsBrand: unique symbol;

/** Money as a signed whole number of US cents. */
export type Cents = number & { readonly [centsBrand]: 'cents' };

/** A signed safe integer, branded as cents. */
export const centsSchema = z.int() as unknown as z.ZodMiniType<Cents, number>;

export const ZERO_CENTS = 0 as Cents;

/** Brands a whole number as cents. Throws on a fraction or an unsafe integer: that is a bug, never input. */
export function cents(amount: number): Cents {
  if (!Number.isSafeInteger(amount)) throw new RangeError(`not a whole number of cents: ${amount}`);
  return (amount === 0 ? 0 : amount) as Cents;
}

/** The sum of amounts in cents; zero for none. */
export function sumCents(amounts: readonly Cents[]): Cents {
  return cents(amounts.reduce((total: number, amount) => total + amount, 0));
}

export function addCents(a: Cents, b: Cents): Cents {
  return cents(a + b);
}

export function subtractCents(a: Cents, b: Cents): Cents {
  return cents(a - b);
}

export function negateCents(a: Cents): Cents {
  return cents(-a);
}

/**
 * Splits a total by weights so that the parts add up to it exactly (largest remainder first, ties to the earlier part).
 * Weights are non-negative and not all zero.
 */
export function splitCents(total: Cents, weights: readonly number[]): Cents[] {
  return splitWhole(total, weights).map(cents);
}

/**
 * Reads a decimal amount in dollars ("-20.14", "$1,204.50", "−20.14", "20.14 CR", "(20.14)") as cents; null when it is no amount of
 * money or has more than two decimals.
 */
export function parseDollars(text: string): Cents | null {
  let body = text.trim().replaceAll('\u2212', '-').replaceAll('$', '').replaceAll(',', '').replace(/\s+/g, ' ');
  let sign = 1;
  const credit = /^(.*?)\s*CR$/i.exec(body);
  if (credit?.[1] !== undefined) {
    body = credit[1];
    sign = -1;
  }
  const bracketed = /^\((.*)\)$/.exec(body);
  if (bracketed?.[1] !== undefined) {
    body = bracketed[1];
    sign = -sign;
  }
  const match = /^([+-]?)\s*(\d{1,12})?(?:\.(\d{0,2}))?$/.exec(body.trim());
  if (!match || (match[2] === undefined && !match[3])) return null;
  if (match[1] === '-') sign = -sign;
  return cents(sign * (Number(match[2] ?? '0') * 100 + Number((match[3] ?? '').padEnd(2, '0'))));
}

/** Cents as a plain decimal in dollars with two decimals and an ASCII minus: "-20.14". For files, not for people. */
export function dollarsText(amount: Cents): string {
  const size = Math.abs(amount);
  return `${amount < 0 ? '-' : ''}${Math.floor(size / 100)}.${String(size % 100).padStart(2, '0')}`;
}
