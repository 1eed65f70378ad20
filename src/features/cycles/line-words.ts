import type { FacingLine } from '#shared/ledger/cycle.ts';
import type { Cents } from '#shared/units/cents.ts';
import { decimal, decimalDollars, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';

/** A quantity with its unit where it is not kWh: "498", "$81.27", "4.2 kW", "31 days". */
export function quantityWords(quantity: string | null, unit: string | null): string {
  if (quantity === null) return '';
  const text = decimal(quantity);
  switch (unit) {
    case 'USD':
      return decimalDollars(wholeCents(quantity));
    case 'kW':
      return `${text} kW`;
    case 'day':
      return `${text} days`;
    case 'cycle':
      return '';
    default:
      return text;
  }
}

/** A sum of dollars always shows its cents: "17.6" → "17.60". */
function wholeCents(dollars: string): string {
  const [whole = '0', part = ''] = dollars.split('.');
  return `${whole}.${part.padEnd(2, '0')}`;
}

/** A rate as the trade writes it: USD per unit as it stands, a share of dollars in percent. */
export function rateWords(rate: string | null, unit: string | null): string {
  if (rate === null || unit === 'cycle') return '';
  return unit === 'USD' ? percentWords(rate) : decimal(rate);
}

/** The verdict between the pages, short enough for its column. */
export function lineVerdict(line: FacingLine): { text: string; look: 'mark-ok' | 'mark-no' | 'mark-wait' } {
  if (line.billed === null) return { text: 'not billed', look: line.verdict === 'differs' ? 'mark-no' : 'mark-wait' };
  if (line.ours === null) return { text: 'only billed', look: line.verdict === 'differs' ? 'mark-no' : 'mark-wait' };
  switch (line.verdict) {
    case 'agrees':
      return { text: 'agrees', look: 'mark-ok' };
    case 'differs':
      return { text: money(Math.abs(line.differenceCents ?? 0) as Cents), look: 'mark-no' };
    case 'nothing-to-compare':
      return { text: line.differenceCents === 0 ? 'as billed' : 'not judged', look: 'mark-wait' };
  }
}
