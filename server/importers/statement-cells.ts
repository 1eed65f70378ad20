import { type Cents, parseDollars } from '#shared/units/cents.ts';
import { type Day, parseDay } from '#shared/units/day.ts';
import { Exact } from '#shared/units/rate.ts';
import type { DecimalText } from '#shared/units/rate-text.ts';

export type DecimalMark = '.' | ',';

const GROUPED = /^\d{1,3}(,\d{3})+(\.\d*)?$/;
const PLAIN = /^(\d{1,12})?(\.\d*)?$/;

/** Brings a decimal comma to a point; null where commas are neither thousands marks nor the decimal mark. */
function withPoint(body: string, mark: DecimalMark): string | null {
  const swapped = mark === ',' ? body.replaceAll('.', '\u0001').replaceAll(',', '.').replaceAll('\u0001', ',') : body;
  const digits = swapped.replace(/[\s\u00a0\u202f']/g, '').replace(/^[-+]/, '');
  return GROUPED.test(digits) || PLAIN.test(digits)
    ? swapped.replaceAll(',', '').replace(/[\s\u00a0\u202f']/g, '')
    : null;
}

/** Signs, brackets, currency and `CR` round an amount, kept apart from its digits so that the commas among them can be checked. */
const DRESSED = /^(\(?)\s*([-+]?)\s*\$?\s*([-+]?)\s*([\d.,\s\u00a0\u202f']+?)\s*(-?)\s*(\)?)\s*(CR)?$/i;

/**
 * An amount of money as printed: `12.34`, `−12.34`, `$1,204.50`, `(12.34)`, `12.34 CR`, `12.34-`. Null when it is none, when it has
 * more than two decimals, or when a comma stands where no thousands mark can ("12,34" in a file that writes decimal points).
 */
export function readMoney(text: string, mark: DecimalMark): Cents | null {
  const body = text.trim().replaceAll('\u2212', '-').replaceAll('\u2013', '-');
  const match = DRESSED.exec(body);
  if (!match) return null;
  const [, open, signBefore, signInside, digits = '', signAfter, close, credit] = match;
  if ((open === '(') !== (close === ')')) return null;
  const signs = [signBefore, signInside, signAfter].filter((sign) => sign !== '');
  if (signs.length > 1 || (open === '(' && signs.length > 0) || (credit !== undefined && signs.length > 0)) return null;
  const plain = withPoint(digits.trim(), mark);
  if (plain === null) return null;
  const negative = open === '(' || signs[0] === '-' || credit !== undefined;
  return parseDollars(negative ? `-${plain}` : plain);
}

/** Leading zeros and a bare point taken off; the decimals stay as many as were printed. */
function trimmedZeros(plain: string): string {
  const [whole = '', decimals = ''] = plain.split('.');
  return `${whole.replace(/^0+(?=\d)/, '') || '0'}${decimals === '' ? '' : `.${decimals}`}`;
}

function signed(sign: string | undefined, size: string): DecimalText | null {
  if (!/^\d{1,12}(\.\d{1,12})?$/.test(size)) return null;
  return sign === '-' && /[1-9]/.test(size) ? `-${size}` : size;
}

/**
 * A quantity, a register or a rate as exact decimal text: `1,284.5`, `−3`, `$0.1684`, `$0.1684/kWh`, `16.84 ¢`, `6.25%` (as the fraction
 * 0.0625), `1.2E-05`. Null when it is none or has more digits than a bill can print.
 */
export function readNumber(text: string, mark: DecimalMark): DecimalText | null {
  const body = text
    .trim()
    .replaceAll('\u2212', '-')
    .replace(/\s*(\/|per)\s*(kwh|kw|day|month|cycle)$/i, '')
    .replace(/\s*kwh$/i, '');
  const match = /^([-+]?)\s*\$?\s*([\d.,\s\u00a0\u202f']+?)(e[-+]?\d{1,2})?\s*([%¢])?$/i.exec(body);
  if (!match) return null;
  const [, sign, digits = '', exponent = '', dress] = match;
  const plain = withPoint(digits, mark);
  if (plain === null || !/\d/.test(plain)) return null;
  if (exponent === '' && dress === undefined) return signed(sign, trimmedZeros(plain));
  const value = new Exact(`${plain}${exponent}`).div(dress === undefined ? 1 : 100);
  return signed(sign, value.toString());
}

const padded = (_: string, year: string, month: string, date: string) =>
  `${year}-${month.padStart(2, '0')}-${date.padStart(2, '0')}`;

/** A date as `2025-08-14` or, as United States statements and spreadsheets write it, `8/14/2025`; null when it is none. */
export function readDate(text: string): Day | null {
  const body = text.trim();
  const slashed = /^(\d{1,2})[/-](\d{1,2})[/-](\d{4}|\d{2})$/.exec(body);
  if (!slashed) return parseDay(body.replace(/^(\d{4})-(\d{1,2})-(\d{1,2})$/, padded));
  const [, month = '', date = '', year = ''] = slashed;
  const fullYear = year.length === 2 ? `20${year}` : year;
  return parseDay(padded(body, fullYear, month, date));
}

const ONLY_COMMA_DECIMAL = /^[-+(\u2212]?\s*\$?(\d{1,3}(\.\d{3})+|\d+),(\d{1,2}|\d{4,})\)?%?$/;
const ONLY_POINT_DECIMAL = /^[-+(\u2212]?\s*\$?(\d{1,3}(,\d{3})+|\d+)\.(\d{1,2}|\d{4,})\)?%?$/;

/**
 * The decimal mark of a file, settled over all its numbers: a comma only where the cells are not themselves divided by commas, some
 * number can only be read so, and none can only be read with a point.
 */
export function decimalMarkOf(delimiter: string, cells: Iterable<string>): DecimalMark {
  if (delimiter === ',') return '.';
  let commas = 0;
  for (const cell of cells) {
    const body = cell.trim();
    if (ONLY_POINT_DECIMAL.test(body)) return '.';
    if (ONLY_COMMA_DECIMAL.test(body)) commas += 1;
  }
  return commas > 0 ? ',' : '.';
}
