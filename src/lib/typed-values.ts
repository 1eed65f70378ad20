import * as z from 'zod/mini';
import { type Cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { kwhText, parseKwh, type Wh } from '#shared/units/energy.ts';
import { decimal } from './format.ts';

/** Reads what people type for an exact decimal ("$0.1684", ".1684", "1,284.5", "−3") as plain decimal text; null when it is none. */
export function plainDecimal(typed: string): string | null {
  const bare = typed
    .trim()
    .replaceAll('\u2212', '-')
    .replace(/[$,\s]/g, '');
  const match = /^([+-]?)(\d{0,12})(?:\.(\d{0,12}))?$/.exec(bare);
  if (!match || (!match[2] && !match[3])) return null;
  const whole = (match[2] ?? '').replace(/^0+(?=\d)/, '') || '0';
  const rest = match[3] ? `.${match[3]}` : '';
  return `${match[1] === '-' ? '-' : ''}${whole}${rest}`;
}

function shifted(text: string, places: number): string {
  const negative = text.startsWith('-');
  const [whole = '', rest = ''] = text.replace('-', '').split('.');
  const digits = places < 0 ? whole.padStart(1 - places, '0') + rest : whole + rest.padEnd(places, '0');
  const point = places < 0 ? Math.max(whole.length, 1 - places) + places : whole.length + places;
  const before = digits.slice(0, point).replace(/^0+(?=\d)/, '') || '0';
  const after = digits.slice(point).replace(/0+$/, '');
  const made = after === '' ? before : `${before}.${after}`;
  return negative && /[1-9]/.test(made) ? `-${made}` : made;
}

/** A percent as typed ("5.49", "5.49 %") as an exact fraction ("0.0549"), by moving the point; null when it is no number. */
export function fractionOfPercent(typed: string): string | null {
  const plain = plainDecimal(typed.replace('%', ''));
  return plain === null ? null : shifted(plain, -2);
}

/** A fraction ("0.0549") as the percent people write ("5.49"). */
export function percentOfFraction(fraction: string): string {
  return shifted(fraction, 2);
}

/** "0.0549" → "5.49%" */
export function percentWords(fraction: string): string {
  return `${decimal(percentOfFraction(fraction))}%`;
}

/** A schema over typed text: what does not read is said in `error`. Empty text passes where `optional`. */
function typedText(reads: (text: string) => boolean, error: string, optional: boolean) {
  return z.string().check(z.refine((text) => (text.trim() === '' ? optional : reads(text)), { error }));
}

const positive = (text: string) => (parseDollars(text) ?? 0) > 0;
const notNegative = (text: string) => (parseDollars(text) ?? -1) >= 0;
export const NUMBER_FAULT = 'Write a number such as 498 or 0.5.';
export const MONEY_FAULT = 'Write an amount in dollars such as 1,204.50.';

/** Form fields as text. Each says what to write when it does not read. */
export const typed = {
  money: typedText((text) => parseDollars(text) !== null, MONEY_FAULT, false),
  moneyOrNone: typedText((text) => parseDollars(text) !== null, MONEY_FAULT, true),
  moneyAboveZero: typedText(positive, 'Write an amount above zero, such as 1,204.50.', false),
  moneyFromZero: typedText(notNegative, 'Write an amount of zero or more, such as 1,204.50.', true),
  kwh: typedText((text) => parseKwh(text) !== null, 'Write kWh as a number such as 498.', false),
  kwhOrNone: typedText((text) => parseKwh(text) !== null, 'Write kWh as a number such as 498.', true),
  day: typedText((text) => parseDay(text) !== null, 'Choose a date.', false),
  dayOrNone: typedText((text) => parseDay(text) !== null, 'Choose a date, or leave it empty.', true),
  rate: typedText((text) => plainDecimal(text) !== null, 'Write a price in dollars such as 0.1684.', false),
  rateOrNone: typedText((text) => plainDecimal(text) !== null, 'Write a price in dollars such as 0.1684.', true),
  number: typedText((text) => plainDecimal(text) !== null, NUMBER_FAULT, false),
  numberOrNone: typedText((text) => plainDecimal(text) !== null, NUMBER_FAULT, true),
  percent: typedText((text) => fractionOfPercent(text) !== null, 'Write a percent such as 5.49.', false),
  percentOrNone: typedText((text) => fractionOfPercent(text) !== null, 'Write a percent such as 5.49.', true),
};

/** A whole number typed within bounds; empty passes where `optional`. */
export function typedWhole(least: number, most: number, optional = false) {
  return typedText(
    (text) => /^\d{1,9}$/.test(text.trim()) && Number(text) >= least && Number(text) <= most,
    `Write a whole number from ${least} to ${most}.`,
    optional,
  );
}

function known<T>(value: T | null, text: string): T {
  if (value === null) throw new Error(`a checked field does not read: ${text}`);
  return value;
}

/** Values of fields that have passed their schema. */
export const fieldValue = {
  cents: (text: string): Cents => known(parseDollars(text), text),
  centsOr: (text: string, none: Cents): Cents => (text.trim() === '' ? none : known(parseDollars(text), text)),
  centsOrNull: (text: string): Cents | null => (text.trim() === '' ? null : known(parseDollars(text), text)),
  wh: (text: string): Wh => known(parseKwh(text), text),
  whOrNull: (text: string): Wh | null => (text.trim() === '' ? null : known(parseKwh(text), text)),
  day: (text: string): Day => known(parseDay(text), text),
  dayOrNull: (text: string): Day | null => (text.trim() === '' ? null : known(parseDay(text), text)),
  decimal: (text: string): string => known(plainDecimal(text), text),
  decimalOrNull: (text: string): string | null => (text.trim() === '' ? null : known(plainDecimal(text), text)),
  fraction: (text: string): string => known(fractionOfPercent(text), text),
  whole: (text: string): number => Number(text.trim()),
  wholeOrNull: (text: string): number | null => (text.trim() === '' ? null : Number(text.trim())),
};

/** Values as a person would type them, for filling a form in; empty for null. */
export const textOf = {
  cents: (amount: Cents | null): string => (amount === null ? '' : dollarsText(amount)),
  wh: (amount: Wh | null): string => (amount === null ? '' : kwhText(amount)),
  whole: (amount: number | null): string => (amount === null ? '' : String(amount)),
  text: (value: string | null): string => value ?? '',
};
