import * as z from 'zod/mini';

declare const whBrand: unique symbol;

/** Energy as a signed whole number of watt-hours. */
export type Wh = number & { readonly [whBrand]: 'Wh' };

/** A signed safe integer, branded as watt-hours. */
export const whSchema = z.int() as unknown as z.ZodMiniType<Wh, number>;

export const ZERO_WH = 0 as Wh;

/** Brands a whole number as watt-hours. Throws on a fraction: that is a bug, never input. */
export function wh(amount: number): Wh {
  if (!Number.isSafeInteger(amount)) throw new RangeError(`not a whole number of Wh: ${amount}`);
  return (amount === 0 ? 0 : amount) as Wh;
}

/** The sum of energies; zero for none. */
export function sumWh(amounts: readonly Wh[]): Wh {
  let total = 0;
  for (const amount of amounts) total += amount;
  return wh(total);
}

/** Wh as an exact decimal text in kWh without trailing zeros: 498500 → "498.5". */
export function kwhText(amount: Wh): string {
  const size = Math.abs(amount);
  const rest = size % 1000;
  const tail = rest === 0 ? '' : `.${String(rest).padStart(3, '0').replace(/0+$/, '')}`;
  return `${amount < 0 ? '-' : ''}${Math.floor(size / 1000)}${tail}`;
}

/** Reads kWh ("498", "1,284.5", "−12.25") as Wh, to the nearest whole Wh; null when it is no number. */
export function parseKwh(text: string): Wh | null {
  const match = /^([+-]?)(\d{1,9})?(?:\.(\d*))?$/.exec(text.trim().replaceAll('\u2212', '-').replaceAll(',', ''));
  if (!match || (match[2] === undefined && !match[3])) return null;
  const decimals = (match[3] ?? '').padEnd(4, '0');
  const size =
    Number(match[2] ?? '0') * 1000 + Number(decimals.slice(0, 3)) + (Number(decimals[3] ?? '0') >= 5 ? 1 : 0);
  return wh(match[1] === '-' ? -size : size);
}
