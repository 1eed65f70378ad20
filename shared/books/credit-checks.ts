import type { CreditFacts } from '../facts/finance.ts';
import { sayMoney } from '../ledger/say.ts';
import { type Cents, cents, sumCents, ZERO_CENTS } from '../units/cents.ts';
import type { CreditLines } from './credit-lines.ts';

/** A check of the form's own arithmetic; `agrees` is null where something is not known yet. */
export type CreditCheck = { label: string; agrees: boolean | null; detail: string };

/**
 * Line 12 of each year is line 16 of the year before, whether that stands in this record or was carried in; no year between is missing; and all that
 * was earned or carried in is used on line 15 or left on the last line 16.
 */
export function creditChecks(lines: readonly CreditLines[], carriedIn: CreditFacts['carriedIn'] = null): CreditCheck[] {
  const checks: CreditCheck[] = [];
  let before =
    carriedIn === null ? null : { taxYear: carriedIn.taxYear, line16Cents: carriedIn.amountCents as Cents | null };
  for (const line of lines) {
    if (before) checks.push(...gap(before.taxYear, line.taxYear, before.line16Cents), follows(before, line));
    before = line;
  }
  const last = lines.at(-1);
  return last ? [...checks, total(lines, last, carriedIn)] : checks;
}

type Before = Pick<CreditLines, 'taxYear' | 'line16Cents'>;

function follows(before: Before, line: CreditLines): CreditCheck {
  const label = `Line 12 of ${line.taxYear} is line 16 of ${before.taxYear}`;
  if (before.line16Cents === null || line.line12Cents === null) {
    return { label, agrees: null, detail: `Type the limit of ${before.taxYear} to know it` };
  }
  return {
    label,
    agrees: line.line12Cents === before.line16Cents,
    detail: `${sayMoney(line.line12Cents)} and ${sayMoney(before.line16Cents)}`,
  };
}

/** A return between two listed years would have used what it could: without it nothing after it is certain. */
function gap(from: number, to: number, carriedCents: Cents | null): CreditCheck[] {
  if (to - from < 2 || carriedCents === 0) return [];
  const missing = Array.from({ length: to - from - 1 }, (_, index) => from + 1 + index);
  return [
    {
      label: `A return for ${missing.join(', ')}`,
      agrees: null,
      detail: 'Not in this record: the form carries the credit through every year; add it with its line 14',
    },
  ];
}

function total(lines: readonly CreditLines[], last: CreditLines, carriedIn: CreditFacts['carriedIn']): CreditCheck {
  const brought = carriedIn?.amountCents ?? ZERO_CENTS;
  const label =
    carriedIn === null
      ? 'All of line 6b is used on line 15 or carried on the last line 16'
      : 'Line 6b and what was carried in are used on line 15 or carried on the last line 16';
  const used = lines.map((line) => line.line15Cents).filter((amount) => amount !== null);
  if (last.line16Cents === null || used.length < lines.length) {
    return { label, agrees: null, detail: 'Type every year’s limit to know it' };
  }
  const earned = sumCents([brought, ...lines.map((line) => line.line6bCents)]);
  return {
    label,
    agrees: cents(sumCents(used) + last.line16Cents) === earned,
    detail: `${sayMoney(earned)} = ${sayMoney(sumCents(used))} used + ${sayMoney(last.line16Cents)} carried`,
  };
}
