import type { DecimalMark } from './statement-cells.ts';

/** What stands in files for "no reading". Never zero. */
const MISSING_MARKS = new Set([
  '',
  '-',
  '--',
  '–',
  '—',
  'na',
  'n/a',
  'n.a.',
  '#n/a',
  'nan',
  'null',
  'none',
  'nil',
  '?',
  'missing',
  'no data',
]);

export function isMissingMark(text: string): boolean {
  return MISSING_MARKS.has(text.trim().toLowerCase());
}

/** Millionths of a unit are kept: a thousandth of what the coarsest stored figure (1 Wh) could ever show. */
export const MICRO_DECIMALS = 6;

const POWERS = Array.from({ length: 16 }, (_, power) => 10 ** power);
const DIGIT_0 = 48;

function scaled(whole: number, decimals: string, keep: number): number | undefined {
  let value = whole * (POWERS[keep] ?? 1);
  const kept = decimals.slice(0, keep);
  if (kept !== '') value += Number(kept) * (POWERS[keep - kept.length] ?? 1);
  if ((decimals.charCodeAt(keep) || DIGIT_0) - DIGIT_0 >= 5) value += 1;
  return Number.isSafeInteger(value) ? value : undefined;
}

/** Units, currency and guards that exporters put round a number: `="12"`, `12.4 kWh`, `(3.1)`, `1'204`, `1 204`, `−3`. */
function undress(text: string): { body: string; negative: boolean } {
  let body = text
    .trim()
    .replace(/^="?(.*?)"?$/, '$1')
    .replaceAll('\u2212', '-');
  body = body.replace(/\s*(kwh|wh|kw|w)$/i, '').replace(/[\s\u00a0\u202f'’]/g, '');
  const bracketed = /^\((.*)\)$/.exec(body);
  if (bracketed?.[1] !== undefined) return { body: bracketed[1], negative: true };
  const negative = body.startsWith('-');
  return { body: body.replace(/^[-+]/, ''), negative };
}

function readDressed(text: string, mark: DecimalMark, keep: number): number | null | undefined {
  if (isMissingMark(text)) return null;
  const { body, negative } = undress(text);
  const pattern =
    mark === '.'
      ? /^(\d{1,15}|\d{1,3}(?:,\d{3})+)?(?:\.(\d*))?(?:e([-+]?\d{1,2}))?$/i
      : /^(\d{1,15}|\d{1,3}(?:\.\d{3})+)?(?:,(\d*))?(?:e([-+]?\d{1,2}))?$/i;
  const match = pattern.exec(body);
  if (!match || (match[1] === undefined && !match[2])) return undefined;
  let whole = (match[1] ?? '0').replace(/[.,]/g, '');
  let decimals = match[2] ?? '';
  const exponent = Number(match[3] ?? '0');
  if (exponent > 0) {
    const moved = decimals.slice(0, exponent).padEnd(exponent, '0');
    decimals = decimals.slice(exponent);
    whole += moved;
  } else if (exponent < 0) {
    const padded = whole.padStart(-exponent + 1, '0');
    decimals = padded.slice(exponent) + decimals;
    whole = padded.slice(0, exponent);
  }
  if (whole.replace(/^0+/, '').length > 15) return undefined;
  const size = scaled(Number(whole), decimals, keep);
  return size === undefined ? undefined : negative && size !== 0 ? -size : size;
}

/**
 * Reads a number as a whole count of 10^−`keep` units, exactly: no float is ever parsed. Null for a missing mark, undefined for what is no
 * number or too large to hold. A plain number takes the quick way, digit by digit.
 */
export function readScaled(text: string, mark: DecimalMark, keep: number): number | null | undefined {
  const point = mark === '.' ? 46 : 44;
  const end = text.length;
  let at = 0;
  let negative = false;
  if (text.charCodeAt(0) === 45) {
    negative = true;
    at = 1;
  }
  let value = 0;
  let digits = 0;
  let decimals = -1;
  for (; at < end; at += 1) {
    const code = text.charCodeAt(at);
    if (code >= DIGIT_0 && code <= 57) {
      digits += 1;
      if (decimals >= 0) {
        if (decimals === keep) return readDressed(text, mark, keep);
        decimals += 1;
      }
      value = value * 10 + (code - DIGIT_0);
    } else if (code === point && decimals < 0) decimals = 0;
    else return readDressed(text, mark, keep);
  }
  if (digits === 0 || digits > 15) return readDressed(text, mark, keep);
  const size = value * (POWERS[keep - Math.max(decimals, 0)] ?? 1);
  if (!Number.isSafeInteger(size)) return undefined;
  return negative && size !== 0 ? -size : size;
}

const ONLY_COMMA = /^[-(+\u2212]?(0,\d+|\d{1,3}(\.\d{3})+,\d+|\d+,(\d{1,2}|\d{4,}))\)?$/;
const ONLY_POINT = /^[-(+\u2212]?(0?\.\d+|\d{1,3}(,\d{3})+\.\d+|\d+\.(\d{1,2}|\d{4,}))\)?$/;
const EITHER = /^[-(+\u2212]?[1-9]\d{0,2}([.,]\d{3})+\)?$/;

/**
 * The decimal mark of a column, by what its numbers can only mean. `certain` is false where every number with a mark could be read both
 * ways (`1,234`).
 */
export function decimalMarkOfColumn(
  cells: Iterable<string>,
  delimiter: string,
): { mark: DecimalMark; certain: boolean } {
  let commas = 0;
  let points = 0;
  let eitherComma = 0;
  let eitherPoint = 0;
  for (const cell of cells) {
    const body = cell.trim();
    if (ONLY_COMMA.test(body)) commas += 1;
    else if (ONLY_POINT.test(body)) points += 1;
    else if (EITHER.test(body)) {
      if (body.includes(',')) eitherComma += 1;
      else eitherPoint += 1;
    }
  }
  if (commas !== points) return { mark: commas > points ? ',' : '.', certain: true };
  if (eitherComma === 0) return { mark: '.', certain: eitherPoint === 0 || delimiter === ',' };
  return { mark: delimiter === ',' ? '.' : ',', certain: false };
}
