import type { CreditView } from '#shared/api/credit.ts';
import type { CreditYear } from '#shared/facts/finance.ts';
import type { Cents } from '#shared/units/cents.ts';
import { decimal, fullDate, money } from '#src/lib/format.ts';

/** An amount as the form has it: whole dollars where it is whole, without the sign of the dollar. */
export function formAmount(amount: Cents): string {
  const text = money(amount).replace('$', '');
  return text.endsWith('.00') ? text.slice(0, -3) : text;
}

/** "0.3" → "30 %" */
export function ratePercent(rate: string): string {
  return `${decimal(String(Number((Number(rate) * 100).toFixed(4))))}%`;
}

/** What became of a year's return: "filed 12 Mar 2025, refund 2 May 2025". */
export function returnWords(year: CreditYear | undefined): string {
  if (!year) return 'not entered';
  if (year.status === 'planned') return 'not filed yet';
  const parts: string[] = [year.status];
  if (year.filedOn) parts[0] = `${year.status} ${fullDate(year.filedOn)}`;
  if (year.asRefund) parts.push(year.refundOn ? `refund ${fullDate(year.refundOn)}` : 'refund awaited');
  else parts.push('lowered the tax due');
  return parts.join(', ');
}

/** "Limit of 2025: line 14 worksheet, 2025 return; typed by Priya; return 2025.pdf." Nothing where no limit is typed. */
export function limitSource(year: CreditYear, view: CreditView): string[] {
  if (year.limitCents === null) return [];
  const paper = view.papers.find(({ id }) => id === year.documentId);
  const parts = [year.limitFrom, year.typedBy && `typed by ${year.typedBy}`, paper?.fileName].filter(
    (part) => typeof part === 'string' && part !== '',
  );
  return parts.length === 0 ? [] : [`Limit of ${year.taxYear}: ${parts.join('; ')}.`];
}

const NUMBER_WORDS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten'];

/** "The credit for a roof completed in 2024, on its way through three returns. The last of it is planned for tax year 2026." */
export function creditLede(view: CreditView): string {
  const { credit, lines } = view;
  if (!credit) return '';
  const placed = credit.placedInServiceOn?.slice(0, 4);
  const count = lines.length;
  const returns = `${NUMBER_WORDS[count] ?? count} ${count === 1 ? 'return' : 'returns'}`;
  const first = placed
    ? `The credit for a roof completed in ${placed}, on its way through ${returns}.`
    : 'Nothing is earned before the day the installation was completed is entered.';
  return [first, lastWords(view)].filter((part) => part !== '').join(' ');
}

function lastWords(view: CreditView): string {
  const statusOf = (taxYear: number) =>
    view.credit?.years.find((year) => year.taxYear === taxYear)?.status ?? 'planned';
  const unknown = view.lines.find((line) => line.line14Cents === null);
  if (unknown) return `The limit for ${unknown.taxYear} is not entered, so what is used then is not known.`;
  const done = view.lines.find((line) => line.line16Cents === 0);
  const last = view.lines.at(-1);
  if (done) {
    return statusOf(done.taxYear) === 'planned'
      ? `The last of it is planned for tax year ${done.taxYear}.`
      : `The last of it was used in tax year ${done.taxYear}.`;
  }
  return last ? `After ${last.taxYear} some is still carried; add the next tax year.` : '';
}
